const LINE_FEED = '\n'
const CARRIAGE_RETURN = '\r'
const BYTE_ORDER_MARK = 0xfeff

/**
 * Visits each line as text[start, end) with its number from 1, without its line ending (LF, CRLF, or CR alone when the
 * text has no LF) and without a byte order mark. Nothing is copied.
 */
export function forEachLine(text: string, visit: (start: number, end: number, line: number) => void): void {
  const ending = text.includes(LINE_FEED) ? LINE_FEED : CARRIAGE_RETURN
  let start = text.charCodeAt(0) === BYTE_ORDER_MARK ? 1 : 0
  for (let line = 1; start < text.length; line++) {
    const found = text.indexOf(ending, start)
    const next = found < 0 ? text.length : found
    visit(start, next > start && text[next - 1] === CARRIAGE_RETURN ? next - 1 : next, line)
    start = next + 1
  }
}
