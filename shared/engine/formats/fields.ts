/** Cutting a line into fields: by semicolons, else commas, else tabs or white space; quotes protect all of them. */

const SPACE = 0x20
const TAB = 0x09
const NO_BREAK_SPACE = 0xa0
const QUOTE = 0x22
const HASH = 0x23
const COMMA = 0x2c
const SEMICOLON = 0x3b

export type Delimiter = ';' | ',' | '\t' | ' '

/** The bounds of a line's data and of its comment. */
export interface LineSurvey {
  /** Data without surrounding white space: text[start, end); empty when start = end. */
  readonly start: number
  readonly end: number
  /** The position after the `#` that opens a comment, or −1. */
  readonly comment: number
  readonly delimiter: Delimiter
}

/** White space within a line. */
const isBlank = (code: number): boolean =>
  code === SPACE || code === TAB || code === NO_BREAK_SPACE || code === 0x0b || code === 0x0c

/** A `#` opens a comment only at the beginning of a field; a quote protects only when it begins one. */
export function surveyLine(text: string, from: number, to: number): LineSurvey {
  let start = from
  while (start < to && isBlank(text.charCodeAt(start))) start++
  let semicolon = false
  let comma = false
  let tab = false
  let quoted = false
  let fresh = true
  let end = start
  let comment = -1
  let closedAt = -1
  for (let p = start; p < to; p++) {
    const code = text.charCodeAt(p)
    if (quoted) {
      quoted = code !== QUOTE
      if (!quoted) closedAt = p
    } else if (isBlank(code)) {
      tab ||= code === TAB
      fresh = true
      continue
    } else if (code === HASH && fresh) {
      comment = p + 1
      break
    } else if (code === QUOTE) quoted = fresh || closedAt === p - 1
    semicolon ||= code === SEMICOLON && !quoted
    comma ||= code === COMMA && !quoted
    fresh = !quoted && (code === SEMICOLON || code === COMMA)
    end = p + 1
  }
  return { start, end, comment, delimiter: semicolon ? ';' : comma ? ',' : tab ? '\t' : ' ' }
}

/** Reads the quoted field that begins at `from`; `next` is the position after the closing quote, −1 if there is none. */
function readQuoted(text: string, from: number, to: number): { value: string; next: number } {
  let value = ''
  let chunk = from + 1
  for (let p = chunk; p < to; p++) {
    if (text.charCodeAt(p) !== QUOTE) continue
    value += text.slice(chunk, p)
    if (p + 1 < to && text.charCodeAt(p + 1) === QUOTE) {
      chunk = ++p
      continue
    }
    return { value, next: p + 1 }
  }
  return { value, next: -1 }
}

/** The end of the data of the unquoted field text[from, …), and where its delimiter stands. */
function scanPlain(text: string, from: number, to: number, delimiter: Delimiter): { end: number; stop: number } {
  const code = delimiter.charCodeAt(0)
  let stop = from
  let end = from
  for (; stop < to; stop++) {
    const here = text.charCodeAt(stop)
    if (here === code || (delimiter === ' ' && isBlank(here))) break
    if (!isBlank(here)) end = stop + 1
  }
  return { end, stop }
}

/**
 * The fields of text[from, to), without surrounding white space; a doubled quote inside quotes stands for one.
 * Returns the reason when the quoting is broken.
 */
export function splitFields(text: string, from: number, to: number, delimiter: Delimiter): string[] | string {
  const fields: string[] = []
  const separator = delimiter.charCodeAt(0)
  for (let p = from; p <= to;) {
    while (p < to && text.charCodeAt(p) !== separator && isBlank(text.charCodeAt(p))) p++
    if (delimiter === ' ') while (p < to && isBlank(text.charCodeAt(p))) p++
    if (p < to && text.charCodeAt(p) === QUOTE) {
      const { value, next } = readQuoted(text, p, to)
      if (next < 0) return 'a quotation mark is not closed'
      const after = scanPlain(text, next, to, delimiter)
      if (after.end > next) return 'text follows a closing quotation mark'
      fields.push(value)
      p = after.stop + 1
    } else {
      const { end, stop } = scanPlain(text, p, to, delimiter)
      fields.push(text.slice(p, end))
      p = stop + 1
    }
  }
  return fields
}
