/**
 * The optimum by dynamic programming on a tree decomposition, as bucket elimination (Bertele & Brioschi, Nonserial
 * Dynamic Programming, 1972; Dechter, Artificial Intelligence 113, 1999): variables are minimised out one by one, and
 * what each leaves is a table over the settings of the neighbours it had left. Bit k of a table's index is the value of
 * the k-th of them; they are ordered by their turn, so the first is bit 0 and its own turn reads even and odd entries.
 */
import type { Control } from '../../control'
import type { EliminationPlan } from './elimination-plan'
import { coefficientTotal, energyGrid } from './grid'
import type { Problem } from '../problem'

/** The optimum of a QUBO, one state that has it, and how far rounding may have led it astray. */
export interface EliminationOutcome {
  /** Without the offset, as the tables have it. */
  readonly energy: number
  /** One byte a variable, 0 or 1. */
  readonly state: Uint8Array
  /** 0 where coefficients share a grid that sums keep exactly. */
  readonly tolerance: number
}

interface Table {
  readonly scope: Uint32Array
  readonly entries: Float64Array
}

/** Pairs of each place with later places. */
function pairsByPlace({ n, rows, cols, values }: Problem, placeOf: Uint32Array): Map<number, number>[] {
  const pairs = Array.from({ length: n }, () => new Map<number, number>())
  for (let k = 0; k < values.length; k++) {
    const [a, b] = [placeOf[rows[k]!]!, placeOf[cols[k]!]!]
    pairs[Math.min(a, b)]!.set(Math.max(a, b), values[k]!)
  }
  return pairs
}

/**
 * Where an index over `scope` stands in a table over some of its places: the sum of two look-ups, one for the lower half
 * of the bits and one for the upper.
 */
function indexMaps(scope: Uint32Array, inner: Uint32Array): { low: Uint32Array; high: Uint32Array; bits: number } {
  const bits = scope.length >> 1
  const target = Array.from(scope, (place) => {
    const at = inner.indexOf(place)
    return at < 0 ? 0 : 2 ** at
  })
  const sums = (weights: number[]): Uint32Array => {
    const table = new Uint32Array(2 ** weights.length)
    weights.forEach((weight, k) => {
      for (let s = 0; s < 2 ** k; s++) table[2 ** k + s] = table[s]! + weight
    })
    return table
  }
  return { low: sums(target.slice(0, bits)), high: sums(target.slice(bits)), bits }
}

/** Adds a table that came to this variable, its bit 0, to the sums for either value of it. */
function addTable(scope: Uint32Array, { scope: inner, entries }: Table, down: Float64Array, up: Float64Array): void {
  const { low, high, bits } = indexMaps(scope, inner)
  const size = 1 << bits
  for (let upper = 0; upper < high.length; upper++) {
    const from = upper << bits
    const base = high[upper]!
    for (let lower = 0; lower < size; lower++) {
      const at = base + low[lower]!
      down[from + lower]! += entries[at]!
      up[from + lower]! += entries[at + 1]!
    }
  }
}

/** The smaller of both sums into `down`; one bit an entry says where it is that of `up`. */
function chooseLeast(down: Float64Array, up: Float64Array, size: number): Uint8Array {
  const choice = new Uint8Array((size + 7) >> 3)
  for (let s = 0; s < size; s++)
    if (up[s]! < down[s]!) {
      down[s] = up[s]!
      choice[s >> 3]! |= 1 << (s & 7)
    }
  return choice
}

/** The state that the choices lead to, from the last variable eliminated back to the first. */
function traceBack({ order, scopes }: EliminationPlan, choices: readonly Uint8Array[]): Uint8Array {
  const byPlace = new Uint8Array(order.length)
  const state = new Uint8Array(order.length)
  for (let place = order.length - 1; place >= 0; place--) {
    let at = 0
    scopes[place]!.forEach((other, k) => (at += byPlace[other]! * 2 ** k))
    byPlace[place] = (choices[place]![at >> 3]! >> (at & 7)) & 1
    state[order[place]!] = byPlace[place]!
  }
  return state
}

/** The variable's own share for value up: its linear term and its pairs, over all settings of its scope. */
function fillOwn(up: Float64Array, linear: number, scope: Uint32Array, pairs: Map<number, number>): void {
  up[0] = linear
  scope.forEach((other, k) => {
    const pair = pairs.get(other) ?? 0
    const size = 2 ** k
    for (let s = 0; s < size; s++) up[size + s] = up[s]! + pair
  })
}

/**
 * Minimises a QUBO along a plan, in about `plan.work` steps and `plan.bytes` bytes. Exact where coefficients share a
 * grid that sums keep; otherwise up to the rounding of a sum of all coefficients, which `tolerance` states.
 * @returns null when it was cancelled
 */
export function minimiseByElimination(
  qubo: Problem,
  plan: EliminationPlan,
  control: Control<{ share: number }>,
): EliminationOutcome | null {
  const { n, linear } = qubo
  const placeOf = new Uint32Array(n)
  plan.order.forEach((v, place) => (placeOf[v] = place))
  const pairs = pairsByPlace(qubo, placeOf)
  const waiting: Table[][] = Array.from({ length: n }, () => [])
  const choices: Uint8Array[] = []
  const spare = new Float64Array(2 ** plan.width)
  let energy = 0
  let done = 0
  for (let place = 0; place < n; place++) {
    if (control.cancelled()) return null
    const scope = plan.scopes[place]!
    const size = 2 ** scope.length
    const up = spare.subarray(0, size)
    const down = new Float64Array(size)
    fillOwn(up, linear[plan.order[place]!]!, scope, pairs[place]!)
    for (const table of waiting[place]!) addTable(scope, table, down, up)
    done += 2 * size * (1 + waiting[place]!.length)
    waiting[place] = []
    choices.push(chooseLeast(down, up, size))
    if (scope.length === 0) energy += down[0]!
    else waiting[scope[0]!]!.push({ scope, entries: down })
    control.report({ share: Math.min(1, done / plan.work) })
  }
  const exact = energyGrid(qubo) !== null
  const tolerance = exact ? 0 : coefficientTotal(qubo) * (n + qubo.values.length) * 2 ** -52
  return { energy, state: traceBack(plan, choices), tolerance }
}
