import { isDecimal } from './numbers'

/** How a table of cells holds a square matrix. */
export interface MatrixShape {
  readonly n: number
  readonly hasHeader: boolean
  readonly hasLabelColumn: boolean
}

/** Numbers can name rows or columns only if they are integers in ascending order. */
function couldBeLabels(cells: readonly string[]): boolean {
  if (!cells.every(isDecimal)) return true
  return cells.every((cell, k) => /^\d+$/.test(cell) && (k === 0 || Number(cell) > Number(cells[k - 1])))
}

/**
 * Decides from the counts where the labels are: rows × cells is n × n, (n + 1) × n with a header row, n × (n + 1) with
 * a label column, (n + 1) × (n + 1) with both, where the header row may lack its corner. A square table is taken to
 * have labels only if its corner is blank or no number. Null when it is none of these.
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
  const corner = first[0]!
  if (rows === width) {
    const named = corner === '' || (!isDecimal(corner) && couldBeLabels(first.slice(1)))
    const hasBoth = rows > 1 && (named || first.length === width - 1)
    return { n: hasBoth ? rows - 1 : rows, hasHeader: hasBoth, hasLabelColumn: hasBoth }
  }
  if (rows === width + 1 && first.length === width && couldBeLabels(first))
    return { n: width, hasHeader: true, hasLabelColumn: false }
  if (width === rows + 1 && couldBeLabels([corner, ...firstColumn]))
    return { n: rows, hasHeader: false, hasLabelColumn: true }
  return null
}
