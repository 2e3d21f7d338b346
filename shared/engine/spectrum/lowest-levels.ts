import { symmetricEigen } from '../graph/layout/symmetric-eigen'
import type { Random } from '../random'
import type { SpinOperator } from './spin-operator'
import { applySpinOperator } from './spin-operator'

/** The lowest levels of an operator, lowest first, and vectors that span them (and a few more), to begin the next from. */
export interface Levels {
  readonly energies: Float64Array
  readonly vectors: readonly Float64Array[]
  /** The largest residual ‖Hv − Ev‖ of the levels: none is farther than that from an exact one. */
  readonly residual: number
}

const DEFAULTS = {
  /** Vectors beyond the levels asked for: a level that comes down from above is met by them. */
  guards: 3,
  degree: 24,
  mostRounds: 60,
  /** After the last round: levels this close together are not told apart any better, and their residual says so. */
  lastTolerance: 1e-4,
  /**
   * The cut at the uppermost vector parts close levels best, but does nothing for levels that coincide on the cut itself, as
   * they do by the dozen without couplings. A round that did not bring the residual down by `stalled` is followed by one
   * whose cut lies `raised` of the spectrum's width higher.
   */
  stalled: 0.5,
  raised: 0.02,
  /** Of a residual, against the width of the spectrum; a level errs by its square over the distance to the next. */
  tolerance: 1e-7,
  /** The first guard must lie this close to a level, or a lower one may still hide in it. */
  guardTolerance: 1e-3,
} as const

const dot = (x: Float64Array, y: Float64Array): number => {
  let sum = 0
  for (let k = 0; k < x.length; k++) sum += x[k]! * y[k]!
  return sum
}

function addTimes(y: Float64Array, factor: number, x: Float64Array): void {
  for (let k = 0; k < y.length; k++) y[k]! += factor * x[k]!
}

function scale(x: Float64Array, factor: number): void {
  for (let k = 0; k < x.length; k++) x[k]! *= factor
}

function fillRandom(x: Float64Array, random: Random): void {
  for (let k = 0; k < x.length; k++) x[k] = random.float() - 0.5
}

/** Gram–Schmidt, twice for each vector; what vanishes is drawn anew. */
function orthonormalise(block: readonly Float64Array[], random: Random): void {
  block.forEach((x, i) => {
    for (;;) {
      const before = Math.sqrt(dot(x, x))
      for (let pass = 0; pass < 2; pass++) for (let j = 0; j < i; j++) addTimes(x, -dot(x, block[j]!), block[j]!)
      const after = Math.sqrt(dot(x, x))
      if (after > 1e-12 * before && after > 0) {
        scale(x, 1 / after)
        return
      }
      fillRandom(x, random)
    }
  })
}

interface Work {
  readonly operator: SpinOperator
  readonly a: number
  readonly b: number
  /** Upper bound of the whole spectrum. */
  readonly top: number
  readonly spare: [Float64Array, Float64Array]
}

/**
 * Amplifies what lies below `cut` by the Chebyshev polynomial that stays within ±1 from `cut` to the top, scaled to 1 at
 * `lowest` so that nothing overflows.
 */
function filter({ operator, a, b, top, spare }: Work, x: Float64Array, cut: number, lowest: number): void {
  const half = (top - cut) / 2
  const middle = (top + cut) / 2
  let [previous, next] = spare
  let current = x
  const first = half / (lowest - middle)
  let sigma = first
  applySpinOperator(operator, a, b, current, next)
  for (let k = 0; k < x.length; k++) next[k] = ((next[k]! - middle * current[k]!) * sigma) / half
  previous.set(current)
  current = next
  next = x
  for (let degree = 2; degree <= DEFAULTS.degree; degree++) {
    const later = 1 / (2 / first - sigma)
    applySpinOperator(operator, a, b, current, next)
    for (let k = 0; k < x.length; k++)
      next[k] = (2 * later * (next[k]! - middle * current[k]!)) / half - sigma * later * previous[k]!
    sigma = later
    const oldest = previous
    previous = current
    current = next
    next = oldest
  }
  if (current !== x) x.set(current)
}

/** Turns an orthonormal block into the approximate eigenvectors of its span; returns their energies, lowest first. */
function rayleighRitz(work: Work, block: Float64Array[], images: Float64Array[]): Float64Array {
  const size = block.length
  block.forEach((x, i) => applySpinOperator(work.operator, work.a, work.b, x, images[i]!))
  const matrix = new Float64Array(size * size)
  for (let i = 0; i < size; i++)
    for (let j = 0; j <= i; j++) matrix[i * size + j] = matrix[j * size + i] = dot(block[i]!, images[j]!)
  const { values, vectors } = symmetricEigen(matrix, size)
  const turn = (from: Float64Array[]): Float64Array[] =>
    Array.from({ length: size }, (_, level) => {
      const turned = new Float64Array(from[0]!.length)
      for (let i = 0; i < size; i++) addTimes(turned, vectors[i * size + (size - 1 - level)]!, from[i]!)
      return turned
    })
  turn(block).forEach((x, i) => block[i]!.set(x))
  turn(images).forEach((x, i) => images[i]!.set(x))
  return values.slice().reverse()
}

function residualOf(x: Float64Array, image: Float64Array, energy: number): number {
  let sum = 0
  for (let k = 0; k < x.length; k++) sum += (image[k]! - energy * x[k]!) ** 2
  return Math.sqrt(sum)
}

function startBlock(size: number, count: number, start: readonly Float64Array[], random: Random): Float64Array[] {
  return Array.from({ length: count }, (_, i) => {
    const x = new Float64Array(size)
    // Guards begin at random: a level of a symmetry that the start lacks would never be met otherwise.
    if (i < count - DEFAULTS.guards && start[i]) x.set(start[i])
    else fillRandom(x, random)
    return x
  })
}

/**
 * The lowest levels of H at one point of the anneal, by subspace iteration with a Chebyshev filter and Rayleigh–Ritz
 * steps (Zhou, Saad, Tiago & Chelikowsky, J. Comput. Phys. 219:172, 2006). Levels that coincide are given as often as
 * they occur.
 * @param a A/2 and b B/2, in the unit that the energies shall have, not both 0
 * @param count levels wanted; all of them where the operator has no more
 * @param start vectors near the lowest ones, such as those of a neighbouring point; may be empty
 * @throws Error when the levels do not settle, which no finite operator of these sizes was seen to do
 */
export function lowestLevels(
  operator: SpinOperator,
  a: number,
  b: number,
  count: number,
  start: readonly Float64Array[],
  random: Random,
): Levels {
  const { size, classical, spins } = operator
  const wanted = Math.min(count, size)
  const width = Math.min(size, wanted + DEFAULTS.guards)
  let [least, most] = [Infinity, -Infinity]
  for (const energy of classical) {
    least = Math.min(least, energy)
    most = Math.max(most, energy)
  }
  const top = b * most + a * spins
  const bottom = b * least - a * spins
  const work: Work = { operator, a, b, top, spare: [new Float64Array(size), new Float64Array(size)] }
  const block = startBlock(size, width, start, random)
  const images = block.map(() => new Float64Array(size))
  orthonormalise(block, random)
  let energies = rayleighRitz(work, block, images)
  let before = Infinity
  for (let round = 0; ; round++) {
    const residuals = energies.map((energy, i) => residualOf(block[i]!, images[i]!, energy))
    const residual = Math.max(...residuals.subarray(0, wanted))
    const isLast = round === DEFAULTS.mostRounds
    const settled = residual <= (isLast ? DEFAULTS.lastTolerance : DEFAULTS.tolerance) * (top - bottom)
    const guarded = width === size || residuals[wanted]! <= DEFAULTS.guardTolerance * (top - bottom)
    if (settled && guarded) return { energies: energies.slice(0, wanted), vectors: block, residual }
    if (isLast) throw new Error(`the lowest levels did not settle in ${round} rounds`)
    const rise = residual > DEFAULTS.stalled * before ? DEFAULTS.raised : 0
    before = residual
    const cut = Math.min(energies[width - 1]! + rise * (top - bottom), top - 1e-9 * (top - bottom))
    for (const x of block) filter(work, x, cut, energies[0]!)
    orthonormalise(block, random)
    energies = rayleighRitz(work, block, images)
  }
}
