/** Eigenvalues in descending order; the vector of `values[k]` is column k: vectors[row·size + k]. */
export interface Eigen {
  readonly values: Float64Array
  readonly vectors: Float64Array
}

const DEFAULTS = { sweeps: 30, tolerance: 1e-24 } as const

/** Turns rows and columns p and q of `matrix` so that its entry (p, q) vanishes, and `vectors` with them. */
function rotate(matrix: Float64Array, vectors: Float64Array, size: number, p: number, q: number): void {
  const entry = matrix[p * size + q]!
  if (entry === 0) return
  const theta = (matrix[q * size + q]! - matrix[p * size + p]!) / (2 * entry)
  const tangent = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1))
  const cosine = 1 / Math.sqrt(tangent * tangent + 1)
  const sine = tangent * cosine
  for (let k = 0; k < size; k++) {
    const [a, b] = [matrix[k * size + p]!, matrix[k * size + q]!]
    matrix[k * size + p] = cosine * a - sine * b
    matrix[k * size + q] = sine * a + cosine * b
  }
  for (let k = 0; k < size; k++) {
    const [a, b] = [matrix[p * size + k]!, matrix[q * size + k]!]
    matrix[p * size + k] = cosine * a - sine * b
    matrix[q * size + k] = sine * a + cosine * b
    const [c, d] = [vectors[k * size + p]!, vectors[k * size + q]!]
    vectors[k * size + p] = cosine * c - sine * d
    vectors[k * size + q] = sine * c + cosine * d
  }
}

function offDiagonal(matrix: Float64Array, size: number): number {
  let sum = 0
  for (let p = 0; p < size; p++) for (let q = p + 1; q < size; q++) sum += matrix[p * size + q]! ** 2
  return sum
}

/**
 * All eigenvalues and vectors of a small dense symmetric matrix by cyclic Jacobi rotations (Golub & Van Loan, Matrix
 * Computations, section 8.5), O(size³) a sweep.
 * @param matrix row by row, length size²; not changed
 */
export function symmetricEigen(matrix: Float64Array, size: number): Eigen {
  const work = matrix.slice()
  const turned = new Float64Array(size * size)
  for (let k = 0; k < size; k++) turned[k * size + k] = 1
  const scale = work.reduce((sum, entry) => sum + entry * entry, 0)
  for (let sweep = 0; sweep < DEFAULTS.sweeps; sweep++) {
    if (offDiagonal(work, size) <= DEFAULTS.tolerance * scale) break
    for (let p = 0; p < size; p++) for (let q = p + 1; q < size; q++) rotate(work, turned, size, p, q)
  }
  const bySize = Array.from({ length: size }, (_, k) => k)
  bySize.sort((a, b) => work[b * size + b]! - work[a * size + a]! || a - b)
  const values = Float64Array.from(bySize, (k) => work[k * size + k]!)
  const vectors = new Float64Array(size * size)
  bySize.forEach((from, to) => {
    for (let row = 0; row < size; row++) vectors[row * size + to] = turned[row * size + from]!
  })
  return { values, vectors }
}
