/** Coefficients as decimal text: read strictly, written with the fewest digits that read back exactly. */

export const LIMITS = {
  /** Beyond these sizes sums, squares and ratios of coefficients would leave the range of doubles. */
  greatest: 1e150,
  least: 1e-150,
}

const POINT = 0x2e
/** Turns `E` into `e`, and no other character of a number into it. */
const LOWER_CASE = 0x20
const LETTER_E = 0x65

const isDigit = (code: number): boolean => code >= 0x30 && code <= 0x39
const isSign = (code: number): boolean => code === 0x2b || code === 0x2d

/** The position after the digits that begin at `from`. */
function skipDigits(text: string, from: number): number {
  let p = from
  while (p < text.length && isDigit(text.charCodeAt(p))) p++
  return p
}

/** Whether the text is a decimal number: sign, digits with at most one point, exponent. One scan. */
export function isDecimal(text: string): boolean {
  const begin = isSign(text.charCodeAt(0)) ? 1 : 0
  let p = skipDigits(text, begin)
  let digits = p - begin
  if (text.charCodeAt(p) === POINT) {
    const fraction = skipDigits(text, p + 1)
    digits += fraction - p - 1
    p = fraction
  }
  if (digits === 0) return false
  if ((text.charCodeAt(p) | LOWER_CASE) === LETTER_E) {
    const exponent = isSign(text.charCodeAt(p + 1)) ? p + 2 : p + 1
    p = skipDigits(text, exponent)
    if (p === exponent) return false
  }
  return p === text.length
}

/** Whether every digit before the exponent is 0. */
function isWrittenZero(text: string): boolean {
  for (let p = 0; p < text.length && text[p] !== 'e' && text[p] !== 'E'; p++)
    if (isDigit(text.charCodeAt(p)) && text[p] !== '0') return false
  return true
}

const isUsable = (size: number): boolean => size >= LIMITS.least && size <= LIMITS.greatest

/** The number, or NaN when the text is no decimal number of usable size; `numberFault` then says why. */
export function parseNumber(text: string): number {
  if (!isDecimal(text)) return Number.NaN
  const value = Number(text)
  if (isUsable(Math.abs(value))) return value
  return value === 0 && isWrittenZero(text) ? 0 : Number.NaN
}

/** Why `parseNumber` refused the text. */
export function numberFault(text: string): string {
  const shown = `"${text.length > 40 ? `${text.slice(0, 40)}…` : text}"`
  if (text === '') return 'the value is missing'
  if (/^[+-]?(?:nan|inf|infinity)$/i.test(text)) return `the value ${shown} is not a finite number`
  if (isDecimal(text))
    return Math.abs(Number(text)) > 1 ? `the value ${shown} is too large` : `the value ${shown} is too close to zero`
  if (/^[+-]?\d+,\d+$/.test(text)) return `the value ${shown} is not a number; write the decimal mark as a point`
  return `the value ${shown} is not a decimal number`
}

/** The shortest decimal text that reads back to the same double; −0 is written 0. */
export const formatNumber = (value: number): string => (value === 0 ? '0' : String(value))
