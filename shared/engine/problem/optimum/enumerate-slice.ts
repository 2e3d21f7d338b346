/**
 * Optima by visiting every state, a slice of them at a time. The highest variables are fixed by the number of the slice,
 * the middle ones go through a Gray code (Gray, US patent 2632058, 1953), so that one flips a step; for each of their
 * settings a block of the lowest variables is gone through by doubling: the energies of the 2^i states with variable i
 * up are those with it down and its field on top. What happens among the block's own variables is the same every time
 * and kept in a table. That is two additions and a comparison a state, none of which waits for another.
 */
import type { Control } from '../../control'
import { toDense } from './dense'
import { coefficientTotal, energyGrid } from './grid'
import type { Problem } from '../problem'

const DEFAULTS = {
  blockBits: 10,
  /** log2 of the states of one slice: a fraction of a second. */
  sliceBits: 25,
  maxVariables: 34,
  /** Optima handed out by a slice; all are counted. */
  maxStates: 1024,
  /** Steps of the middle variables after which fields and energy are computed afresh, to keep rounding from building up. */
  refreshSteps: 64,
}

/** The most variables that can be enumerated. */
export const MOST_ENUMERATED = DEFAULTS.maxVariables

/** What one slice, or all of them together, found. */
export interface SliceOutcome {
  /** Without the offset; Infinity when the slice was given up before its first block. */
  readonly energy: number
  /** States within the tolerance of it. */
  readonly count: number
  /** The first 1024 of them in order of slice: one byte a variable, 0 or 1. */
  readonly states: readonly Uint8Array[]
  /** False when it was given up: the energy is then the best so far. */
  readonly complete: boolean
}

/** How many slices a problem of n variables is cut into. */
export const sliceCount = (n: number): number => 2 ** Math.max(0, n - DEFAULTS.sliceBits)

/**
 * How far apart two computed energies of equal true energy may lie: 0 where coefficients share a grid that sums keep
 * exactly, else the rounding that a refreshed walk can gather.
 */
export const enumerationTolerance = (qubo: Problem): number =>
  energyGrid(qubo) === null ? coefficientTotal(qubo) * 2 ** -43 : 0

interface Walk {
  readonly n: number
  readonly block: number
  /** First variable fixed by the slice. */
  readonly top: number
  readonly linear: Float64Array
  readonly pairs: Float64Array
  readonly up: Uint8Array
  /** Σ of the pairs with variables that are up outside the block. */
  readonly fields: Float64Array
  energy: number
  best: number
  count: number
  codes: number[]
  readonly tolerance: number
}

/** Energies of the block's variables alone, for each of their settings. */
function blockTable({ n, block, linear, pairs }: Walk): Float64Array {
  const table = new Float64Array(2 ** block)
  const field = new Float64Array(2 ** block)
  for (let i = 0; i < block; i++) {
    const size = 2 ** i
    field[0] = linear[i]!
    for (let j = 0; j < i; j++) for (let s = 0; s < 2 ** j; s++) field[2 ** j + s] = field[s]! + pairs[i * n + j]!
    for (let s = 0; s < size; s++) table[size + s] = table[s]! + field[s]!
  }
  return table
}

/** Fields, and the energy of what is up outside the block. */
function refresh(walk: Walk): void {
  const { n, block, linear, pairs, up, fields } = walk
  let energy = 0
  for (let i = 0; i < n; i++) {
    let field = 0
    for (let j = block; j < n; j++) if (up[j] === 1) field += pairs[i * n + j]!
    fields[i] = field
    if (i >= block && up[i] === 1) energy += linear[i]! + field / 2
  }
  walk.energy = energy
}

function flip(walk: Walk, v: number): void {
  const { n, pairs, up, fields, linear } = walk
  const sign = up[v] === 1 ? -1 : 1
  walk.energy += sign * (linear[v]! + fields[v]!)
  up[v] = 1 - up[v]!
  for (let i = 0; i < n; i++) fields[i]! += sign * pairs[v * n + i]!
}

function note(walk: Walk, energy: number, setting: number): void {
  if (energy < walk.best - walk.tolerance) {
    walk.count = 0
    walk.codes = []
  }
  walk.best = Math.min(walk.best, energy)
  walk.count++
  if (walk.codes.length >= DEFAULTS.maxStates) return
  let code = setting
  for (let i = walk.block; i < walk.n; i++) code += walk.up[i]! * 2 ** i
  walk.codes.push(code)
}

/** All settings of the block under the present setting of the others. */
function scanBlock(walk: Walk, table: Float64Array, sums: Float64Array): void {
  const { block, fields, energy, tolerance } = walk
  let limit = walk.best + tolerance
  sums[0] = energy
  if (energy + table[0]! <= limit) {
    note(walk, energy + table[0]!, 0)
    limit = walk.best + tolerance
  }
  for (let i = 0; i < block; i++) {
    const size = 1 << i
    const field = fields[i]!
    for (let s = 0; s < size; s++) {
      const sum = sums[s]! + field
      sums[size + s] = sum
      const total = sum + table[size + s]!
      if (total <= limit) {
        note(walk, total, size + s)
        limit = walk.best + tolerance
      }
    }
  }
}

function startWalk(qubo: Problem, slice: number): Walk {
  const { n } = qubo
  const top = Math.min(n, DEFAULTS.sliceBits)
  const up = new Uint8Array(n)
  for (let i = top; i < n; i++) up[i] = Math.floor(slice / 2 ** (i - top)) % 2
  return {
    n,
    block: Math.min(top, DEFAULTS.blockBits),
    top,
    linear: qubo.linear,
    pairs: toDense(qubo),
    up,
    fields: new Float64Array(n),
    energy: 0,
    best: Infinity,
    count: 0,
    codes: [],
    tolerance: enumerationTolerance(qubo),
  }
}

/**
 * Visits the states of one slice of a QUBO, about 3·2^25 operations. Exact where coefficients share a grid that sums
 * keep (integers, dyadic fractions); otherwise states whose energies differ by no more than rounding count as equal.
 * @param slice 0 … sliceCount(n) − 1
 * @throws RangeError for more than 34 variables or a slice that does not exist
 */
export function enumerateSlice(qubo: Problem, slice: number, control: Control<{ share: number }>): SliceOutcome {
  const { n } = qubo
  if (n > DEFAULTS.maxVariables)
    throw new RangeError(`enumeration is for at most ${DEFAULTS.maxVariables} variables, not ${n}`)
  if (!(Number.isInteger(slice) && slice >= 0 && slice < sliceCount(n)))
    throw new RangeError(`slice ${slice} is outside 0 … ${sliceCount(n) - 1}`)
  const walk = startWalk(qubo, slice)
  const table = blockTable(walk)
  const sums = new Float64Array(table.length)
  const steps = 2 ** (walk.top - walk.block)
  let complete = true
  for (let step = 0; step < steps && complete; step++) {
    if (step > 0) flip(walk, walk.block + 31 - Math.clz32(step & -step))
    if (step % DEFAULTS.refreshSteps === 0) {
      refresh(walk)
      control.report({ share: step / steps })
    }
    scanBlock(walk, table, sums)
    complete = step % DEFAULTS.refreshSteps !== 0 || !control.cancelled() || step === steps - 1
  }
  const states = walk.codes.map((code) => Uint8Array.from({ length: n }, (_, i) => Math.floor(code / 2 ** i) % 2))
  return { energy: walk.best, count: walk.count, states, complete }
}

/**
 * The outcome of several slices as if they were one, in the order given.
 * @param tolerance see `enumerationTolerance`
 */
export function mergeSlices(slices: readonly SliceOutcome[], tolerance: number): SliceOutcome {
  const energy = slices.reduce((best, slice) => Math.min(best, slice.energy), Infinity)
  const best = slices.filter((slice) => slice.energy <= energy + tolerance)
  return {
    energy,
    count: best.reduce((sum, { count }) => sum + count, 0),
    states: best.flatMap(({ states }) => states).slice(0, DEFAULTS.maxStates),
    complete: slices.every(({ complete }) => complete),
  }
}
