/**
 * The little of XML 1.0 that a graph needs, read from a whole text: elements with attributes, character data, CDATA,
 * comments and processing instructions passed over. There are no document types and so no entities beyond the five
 * predefined ones and character references: nothing outside the file is ever read, and nothing in it grows.
 */
import { ReadingFault } from '../../formats/format'

export interface XmlHandler {
  /** @param name without its prefix */
  open(name: string, attributes: ReadonlyMap<string, string>, line: number): void
  text(text: string): void
  close(name: string, line: number): void
}

const MOST_NESTED = 64
const LINE_FEED = 0x0a
const ENTITIES: Readonly<Record<string, string>> = { lt: '<', gt: '>', amp: '&', quot: '"', apos: "'" }
const ATTRIBUTE = /\s*([^\s=/>"'<]+)\s*=\s*(?:"([^"<]*)"|'([^'<]*)')/y
const NAME = /[^\s/>"'<=]+/y

const localName = (name: string): string => name.slice(name.lastIndexOf(':') + 1)

class XmlReader {
  private place = 0
  private line = 1
  private counted = 0
  private readonly open: string[] = []
  private hasRoot = false

  constructor(
    private readonly source: string,
    private readonly handler: XmlHandler,
  ) {}

  /** The line of the present place; counted on from the last time. */
  private here(): number {
    for (; this.counted < this.place; this.counted++)
      if (this.source.charCodeAt(this.counted) === LINE_FEED) this.line++
    return this.line
  }

  private fault(message: string): ReadingFault {
    return new ReadingFault(message, this.here())
  }

  private decoded(text: string): string {
    if (!text.includes('&')) return text
    return text.replace(/&([^;\s&]{0,12});?/g, (whole, name: string) => {
      const code = /^#(?:x([0-9a-fA-F]{1,6})|(\d{1,7}))$/.exec(name)
      const point = code ? (code[1] ? Number.parseInt(code[1], 16) : Number(code[2])) : -1
      if (whole.endsWith(';') && point >= 0 && point <= 0x10ffff) return String.fromCodePoint(point)
      if (whole.endsWith(';') && Object.hasOwn(ENTITIES, name)) return ENTITIES[name]!
      throw this.fault(`the reference ${whole.slice(0, 20)} means nothing here: only XML’s own five entities are read`)
    })
  }

  /** Passes over `opener … closer`; answers what stands between. */
  private between(opener: string, closer: string, what: string): string {
    const end = this.source.indexOf(closer, this.place + opener.length)
    if (end < 0) throw this.fault(`${what} is not closed`)
    const inside = this.source.slice(this.place + opener.length, end)
    this.place = end + closer.length
    return inside
  }

  private characters(text: string): void {
    if (this.open.length > 0) this.handler.text(text)
    else if (text.trim() !== '') throw this.fault('text stands outside the first element')
  }

  private attributes(): Map<string, string> {
    const found = new Map<string, string>()
    for (;;) {
      ATTRIBUTE.lastIndex = this.place
      const match = ATTRIBUTE.exec(this.source)
      if (!match) return found
      const name = match[1]!
      if (found.has(name)) throw this.fault(`the attribute ${name.slice(0, 40)} stands twice`)
      found.set(name, this.decoded(match[2] ?? match[3]!))
      this.place = ATTRIBUTE.lastIndex
    }
  }

  private tagName(): string {
    NAME.lastIndex = this.place
    const name = NAME.exec(this.source)?.[0]
    if (!name) throw this.fault('"<" begins no element; write it as &lt;')
    this.place += name.length
    return name
  }

  private passBlanks(): void {
    while (/\s/.test(this.source[this.place] ?? '')) this.place++
  }

  private closeTag(): void {
    this.place += 2
    const name = this.tagName()
    this.passBlanks()
    if (this.source[this.place] !== '>') throw this.fault(`the end of ${name.slice(0, 40)} is not closed`)
    const expected = this.open.pop()
    if (name !== expected) throw this.fault(`${name.slice(0, 40)} ends where ${expected ?? 'nothing'} is open`)
    this.handler.close(localName(name), this.here())
    this.place++
  }

  private openTag(): void {
    if (this.open.length === 0 && this.hasRoot) throw this.fault('there is more than one outermost element')
    const line = this.here()
    this.place++
    const name = this.tagName()
    const attributes = this.attributes()
    this.passBlanks()
    const isEmpty = this.source.startsWith('/>', this.place)
    if (!isEmpty && this.source[this.place] !== '>')
      throw this.fault(`the element ${name.slice(0, 40)} is not written right`)
    this.place += isEmpty ? 2 : 1
    this.hasRoot = true
    if (this.open.length >= MOST_NESTED) throw this.fault(`elements are nested more than ${MOST_NESTED} deep`)
    this.handler.open(localName(name), attributes, line)
    if (isEmpty) this.handler.close(localName(name), line)
    else this.open.push(name)
  }

  private markup(): void {
    const at = (text: string): boolean => this.source.startsWith(text, this.place)
    if (at('<!--')) this.between('<!--', '-->', 'a comment')
    else if (at('<![CDATA[')) this.characters(this.between('<![CDATA[', ']]>', 'a CDATA section'))
    else if (at('<!')) throw this.fault('document types and entities are not read: take the DOCTYPE out')
    else if (at('<?')) this.between('<?', '?>', 'a processing instruction')
    else if (at('</')) this.closeTag()
    else this.openTag()
  }

  read(): void {
    while (this.place < this.source.length) {
      const next = this.source.indexOf('<', this.place)
      const end = next < 0 ? this.source.length : next
      if (end > this.place) this.characters(this.decoded(this.source.slice(this.place, end)))
      this.place = end
      if (next >= 0) this.markup()
    }
    if (this.open.length > 0) throw this.fault(`${this.open.at(-1)!.slice(0, 40)} is not closed: the file is cut short`)
    if (!this.hasRoot) throw this.fault('the file holds no element')
  }
}

/** @throws ReadingFault with the line where the text is not well formed */
export const readXml = (text: string, handler: XmlHandler): void => new XmlReader(text, handler).read()
