import type { ReadingIssue } from './format'
import type { MatrixRow } from './matrix-rows'
import { isDecimal } from './numbers'

/** How a table of cells holds a square matrix. */
export interface MatrixShape {
  readonly n: number
  readonly hasHeader: boolean
  readonly hasLabelColumn: boolean
}

/** The corner that says beyond doubt that labels follow, even if they look like coefficients. */
export const LABEL_CORNER = 'variable'

const holdsWord = (cells: readonly string[]): boolean => !cells.every(isDecimal)

/** Whether a first row that begins with no number names the columns, rather than being a row with a faulty cell. */
function namesColumns(first: readonly string[], firstColumn: readonly string[]): boolean {
  const [corner, ...names] = first
  if (corner!.toLowerCase() === LABEL_CORNER || holdsWord(names)) return true
  return corner === '' && names.every((name, k) => /^\d+$/.test(name) && name === firstColumn[k])
}

/**
 * Decides from the counts where the labels are: rows × cells is n × n, (n + 1) × n with a header row, n × (n + 1) with
 * a label column, (n + 1) × (n + 1) with both, where the header row may lack its corner. Rows and columns of numbers
 * alone are never taken for labels, unless the corner is `variable`, or is blank and both hold the same whole numbers:
 * a table with a row too many is a mistake to be told, not guessed at. Null when it is none of these.
 * @param first cells of the first row
 * @param firstColumn first cell of each row after the first
 * @param rows number of rows
 * @param width number of cells that most rows have
 */
export function matrixShape(
  first: readonly string[],
  firstColumn: readonly string[],
  rows: number,
  width: number,
): MatrixShape | null {
  if (rows === width) {
    const hasCorner = first.length === width
    const named = hasCorner ? !isDecimal(first[0]!) && namesColumns(first, firstColumn) : holdsWord(first)
    const hasBoth = rows > 1 && named
    return { n: hasBoth ? rows - 1 : rows, hasHeader: hasBoth, hasLabelColumn: hasBoth }
  }
  if (rows === width + 1 && first.length === width && holdsWord(first))
    return { n: width, hasHeader: true, hasLabelColumn: false }
  if (width === rows + 1 && holdsWord([first[0]!, ...firstColumn]))
    return { n: rows, hasHeader: false, hasLabelColumn: true }
  return null
}

/** The number of cells that most rows have; of equally common ones, the one that comes first. */
function commonWidth(widths: readonly number[]): number {
  const counts = new Map<number, number>()
  for (const width of widths) counts.set(width, (counts.get(width) ?? 0) + 1)
  return [...counts].reduce((best, entry) => (entry[1] > best[1] ? entry : best))[0]
}

function notSquare(rows: readonly MatrixRow[], widths: readonly number[], width: number): ReadingIssue {
  const odd = widths.findIndex((count) => count !== width)
  const { line } = rows[Math.max(0, odd)]!
  const finding =
    odd < 0 ? `${rows.length} rows of ${width} cells` : `line ${line} has ${widths[odd]} cells, most have ${width}`
  return { line, message: `the matrix is not square: ${finding}` }
}

/** The shape of a table, or what keeps it from being a square matrix. */
export function shapeOf(rows: readonly MatrixRow[], firstRow: readonly string[]): MatrixShape | ReadingIssue {
  if (rows.length === 0) return { message: 'there are no coefficients: expected the rows of a square matrix' }
  const widths = rows.map((row) => row.width)
  const width = commonWidth(widths)
  const firstColumn = rows.slice(1).map((row) => row.first)
  return matrixShape(firstRow, firstColumn, rows.length, width) ?? notSquare(rows, widths, width)
}
