/** A line whose only comma is the decimal one of its value. */
const DECIMAL_COMMA = /^([^,#]*[\s;][+-]?\d+),(\d+)(?=\s*(?:#[^]*)?$)/

/** Writes a point for the decimal comma of the value on the given lines (from 1); other lines stay as they are. */
export function mendDecimalCommas(text: string, lineNumbers: readonly number[]): string {
  const chosen = new Set(lineNumbers)
  return text
    .split('\n')
    .map((line, index) => (chosen.has(index + 1) ? line.replace(DECIMAL_COMMA, '$1.$2') : line))
    .join('\n')
}

/** Lines among these whose value is written with a decimal comma. */
export function decimalCommaLines(lines: readonly { line: number; text: string }[]): number[] {
  return lines.filter(({ text }) => DECIMAL_COMMA.test(text)).map(({ line }) => line)
}
