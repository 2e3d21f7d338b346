import type { RejectedLine } from './format'

const DEFAULTS = { kept: 100, textLength: 200, listed: 100_000 }

/** Databases store neither U+0000 nor the half of a character that a cut may leave. */
const storable = (text: string): string => text.replace(/\0|\p{Cs}/gu, '\uFFFD')

const quoted = (text: string): string => `"${text.replaceAll('"', '""')}"`

/** Collects rejected lines: the first 100 with their text, the first 100,000 as a list, all of them counted. */
export class Rejections {
  readonly lines: RejectedLine[] = []
  count = 0
  private readonly rows: string[] = []

  add(text: string, start: number, end: number, line: number, reason: string): void {
    this.count++
    if (this.rows.length >= DEFAULTS.listed) return
    const cut = end - start > DEFAULTS.textLength
    const shown = text.slice(start, cut ? start + DEFAULTS.textLength : end)
    const rejected = { line, text: storable(cut ? `${shown}…` : shown), reason: storable(reason) }
    if (this.lines.length < DEFAULTS.kept) this.lines.push(rejected)
    this.rows.push(`${line},${quoted(rejected.reason)},${quoted(rejected.text)}`)
  }

  /** How many lines the list holds. */
  get listed(): number {
    return this.rows.length
  }

  /** The rejected lines as CSV `line,reason,text`, texts cut to 200 characters; says so at its end when there are more. */
  list(): string {
    if (this.count === 0) return ''
    const rest = this.count - this.rows.length
    const end = rest > 0 ? [`,${quoted(`${rest} more lines were rejected and are not listed`)},`] : []
    return `${['line,reason,text', ...this.rows, ...end].join('\r\n')}\r\n`
  }
}
