import type { Problem } from '../problem'

/** The full symmetric matrix of the interactions, row-major, with zeros on the diagonal. */
export function toDense({ n, rows, cols, values }: Problem): Float64Array {
  const matrix = new Float64Array(n * n)
  for (let k = 0; k < values.length; k++) {
    matrix[rows[k]! * n + cols[k]!] = values[k]!
    matrix[cols[k]! * n + rows[k]!] = values[k]!
  }
  return matrix
}
