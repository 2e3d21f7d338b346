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
