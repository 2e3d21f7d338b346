/**
 * Ground states by visiting all 2^n states in Gray-code order (Gray, US patent 2632058, 1953): one variable flips a
 * step, so the energy change is read off a local field and only the fields of its neighbours change.
 */
import { convertForm } from './convert'
import { energyOf } from './energy'
import type { Form, Problem } from './problem'

const DEFAULTS = {
  maxVariables: 24,
  /** Ground states handed out; all are counted. */
  maxStates: 1024,
  /** log2 of the steps after which fields and energy are computed afresh: saves work and keeps rounding from building up. */
  blockBits: 10,
}

/** The lowest energy, how many states reach it, and the first 1024 of them in the order they were met. */
export interface GroundStates {
  readonly energy: number
  /** One byte a variable: 1 is up (x = 1, s = +1), 0 is down (x = 0, s = −1). */
  readonly states: Uint8Array[]
  readonly count: number
}

const sizeOfAll = (problem: Problem): number =>
  problem.linear.reduce((sum, value) => sum + Math.abs(value), 0) +
  problem.values.reduce((sum, value) => sum + Math.abs(value), 0)

/**
 * How far apart two computed energies of equal true energy may lie: 0 when all coefficients are multiples of one power
 * of two and no sum needs more than 53 bits, else the rounding that a block of steps can gather.
 */
function tieTolerance(ising: Problem): number {
  const total = 4 * sizeOfAll(ising)
  let unit = 1
  for (const list of [ising.linear, ising.values])
    for (const value of list) while (!Number.isInteger(value / unit) && unit > 2 ** -200) unit /= 2
  return total / unit < 2 ** 53 ? 0 : total * 2 ** (DEFAULTS.blockBits - 52)
}

interface Walk {
  readonly n: number
  /** Full matrix of J, row-major. */
  readonly couplings: Float64Array
  readonly linear: Float64Array
  readonly spins: Float64Array
  readonly fields: Float64Array
  readonly tolerance: number
  energy: number
  code: number
  best: number
  count: number
  codes: number[]
}

function startWalk(ising: Problem): Walk {
  const { n } = ising
  const couplings = new Float64Array(n * n)
  for (let k = 0; k < ising.values.length; k++) {
    couplings[ising.rows[k]! * n + ising.cols[k]!] = ising.values[k]!
    couplings[ising.cols[k]! * n + ising.rows[k]!] = ising.values[k]!
  }
  return {
    n,
    couplings,
    linear: ising.linear,
    spins: new Float64Array(n).fill(-1),
    fields: new Float64Array(n),
    tolerance: tieTolerance(ising),
    energy: 0,
    code: 0,
    best: Infinity,
    count: 0,
    codes: [],
  }
}

/** Fields h_i + Σ_j J_ij s_j and the energy without offset, from the spins. */
function refresh(walk: Walk): void {
  const { n, couplings, linear, spins, fields } = walk
  let energy = 0
  for (let i = 0; i < n; i++) {
    let pull = 0
    for (let j = 0; j < n; j++) pull += couplings[i * n + j]! * spins[j]!
    fields[i] = linear[i]! + pull
    energy += (linear[i]! + pull / 2) * spins[i]!
  }
  walk.energy = energy
}

function note(walk: Walk, energy: number, code: number): void {
  if (energy < walk.best - walk.tolerance) {
    walk.count = 0
    walk.codes = []
  }
  walk.best = Math.min(walk.best, energy)
  walk.count++
  if (walk.codes.length < DEFAULTS.maxStates) walk.codes.push(code)
}

/**
 * Steps `from` … `to` − 1 of the Gray code, a block that `from` begins; step t flips the variable of t's lowest set bit.
 * After its first step a block flips low variables only, so only their fields are kept up; `refresh` mends the rest.
 */
function walkBlock(walk: Walk, from: number, to: number): void {
  const { n, couplings, spins, fields, tolerance } = walk
  const low = Math.min(n, DEFAULTS.blockBits)
  let { energy, code } = walk
  for (let step = from; step < to; step++) {
    const flipped = 31 - Math.clz32(step & -step)
    const change = -2 * spins[flipped]!
    energy += change * fields[flipped]!
    spins[flipped] = -spins[flipped]!
    code ^= 1 << flipped
    const row = flipped * n
    for (let j = 0; j < low; j++) fields[j]! += change * couplings[row + j]!
    if (energy <= walk.best + tolerance) note(walk, energy, code)
  }
  walk.code = code
}

/**
 * All ground states of a problem by full enumeration, about 10·2^n operations (24 variables: about a second).
 * Exact for integer and dyadic coefficients; otherwise states whose energies differ by no more than rounding count
 * as equal.
 * @throws RangeError for more than `maxVariables` variables, or more than 30 in any case
 */
export function groundStates(problem: Problem, form: Form, maxVariables = DEFAULTS.maxVariables): GroundStates {
  const { n } = problem
  const limit = Math.min(maxVariables, 30)
  if (n > limit) throw new RangeError(`enumeration is for at most ${limit} variables, not ${n}`)
  const walk = startWalk(convertForm(problem, form, 'ising'))
  refresh(walk)
  note(walk, walk.energy, walk.code)
  const block = 2 ** DEFAULTS.blockBits
  for (let from = 0; from < 2 ** n; from += block) {
    refresh(walk)
    walkBlock(walk, Math.max(1, from), Math.min(from + block, 2 ** n))
  }
  const states = walk.codes.map((code) => Uint8Array.from({ length: n }, (_, i) => (code >>> i) & 1))
  const down = form === 'ising' ? -1 : 0
  const values = Array.from(states[0]!, (bit) => (bit === 1 ? 1 : down))
  return { energy: energyOf(problem, values), states, count: walk.count }
}
