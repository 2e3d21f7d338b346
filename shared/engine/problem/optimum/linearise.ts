/**
 * A QUBO as a mixed integer linear programme: each product x_i x_j becomes a variable y_ij (Glover & Woolsey, Converting
 * the 0-1 polynomial programming problem to a 0-1 linear program, Operations Research 22, 1974). Of y_ij ≤ x_i,
 * y_ij ≤ x_j and y_ij ≥ x_i + x_j − 1 a minimum needs only those against which its coefficient pushes: the first two
 * where it is negative, the last where it is positive. Then y_ij is 0 or 1 by itself where both x are.
 */
import type { Problem } from '../problem'

/**
 * Minimise cost·z with rowLower ≤ A z and z within 0 … columnUpper; the first `binaries` columns are the x of the
 * variables and whole numbers, the others the y of the interactions. A in rows: row r has the columns
 * columns[rowStarts[r] … rowStarts[r + 1] − 1] with `weights`.
 */
export interface LinearProgramme {
  readonly binaries: number
  readonly cost: Float64Array
  readonly columnUpper: Float64Array
  readonly rowStarts: Int32Array
  readonly columns: Int32Array
  readonly weights: Float64Array
  readonly rowLower: Float64Array
  /** What the costs were divided by: a power of two that brings the largest near 1. */
  readonly scale: number
}

/** Whether flipping all variables at once changes no energy: 2a_i + Σ_j b_ij = 0 for every variable. */
export function isFlipSymmetric({ n, linear, rows, cols, values }: Problem): boolean {
  const pull = Float64Array.from(linear, (value) => 2 * value)
  for (let k = 0; k < values.length; k++) {
    pull[rows[k]!]! += values[k]!
    pull[cols[k]!]! += values[k]!
  }
  return n > 0 && pull.every((value) => value === 0)
}

const powerNear = (value: number): number => (value > 0 ? 2 ** Math.round(Math.log2(value)) : 1)

/**
 * The programme of a QUBO, its offset left out. Where all variables may be flipped at once, the one with most
 * interactions is fixed at 0: of every two states that are each other's mirror one is enough.
 */
export function linearise(qubo: Problem): LinearProgramme {
  const { n, linear, rows, cols, values } = qubo
  const rowStarts = [0]
  const columns: number[] = []
  const weights: number[] = []
  const rowLower: number[] = []
  const addRow = (lower: number, ...entries: [number, number][]): void => {
    for (const [column, weight] of entries) {
      columns.push(column)
      weights.push(weight)
    }
    rowStarts.push(columns.length)
    rowLower.push(lower)
  }
  values.forEach((value, k) => {
    const [i, j, y] = [rows[k]!, cols[k]!, n + k]
    if (value > 0) addRow(-1, [y, 1], [i, -1], [j, -1])
    else {
      addRow(0, [i, 1], [y, -1])
      addRow(0, [j, 1], [y, -1])
    }
  })
  const cost = Float64Array.from([...linear, ...values])
  const scale = powerNear(cost.reduce((most, value) => Math.max(most, Math.abs(value)), 0))
  const columnUpper = new Float64Array(n + values.length).fill(1)
  if (isFlipSymmetric(qubo)) columnUpper[busiest(qubo)] = 0
  return {
    binaries: n,
    cost: cost.map((value) => value / scale),
    columnUpper,
    rowStarts: Int32Array.from(rowStarts),
    columns: Int32Array.from(columns),
    weights: Float64Array.from(weights),
    rowLower: Float64Array.from(rowLower),
    scale,
  }
}

function busiest({ n, rows, cols }: Problem): number {
  const degree = new Uint32Array(n)
  for (const v of rows) degree[v]!++
  for (const v of cols) degree[v]!++
  return degree.indexOf(degree.reduce((most, value) => Math.max(most, value), 0))
}

/** Values of all columns at a state, mirrored where the programme has fixed a variable that is up in it. */
export function columnsOf(
  { n, rows, cols, values }: Problem,
  programme: LinearProgramme,
  state: Uint8Array,
): Float64Array {
  const isMirrored = state.some((value, i) => value === 1 && programme.columnUpper[i] === 0)
  const x = Uint8Array.from(state, (value) => (isMirrored ? 1 - value : value))
  const filled = new Float64Array(n + values.length)
  filled.set(x)
  for (let k = 0; k < values.length; k++) filled[n + k] = x[rows[k]!]! * x[cols[k]!]!
  return filled
}
