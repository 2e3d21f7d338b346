import type { Problem } from '../problem/problem'
import type { CouplingList } from '../sampling/physical-model'
import { firstEqualRows } from '../sampling/merge'
import { strideOf, unpackRow } from '../sampling/samples'
import type { Samples } from '../sampling/samples'

function requireWidth(samples: Samples, n: number): void {
  if (samples.width !== n) throw new RangeError(`states of ${samples.width} spins for a problem of ${n}`)
}

/**
 * Energy of every row under a logical problem in Ising form, its offset included.
 * @throws RangeError for states of another width
 */
export function logicalEnergies(ising: Problem, states: Samples): Float64Array {
  requireWidth(states, ising.n)
  const { linear, rows, cols, values } = ising
  const spins = new Int8Array(ising.n)
  return Float64Array.from({ length: states.rows }, (_, r) => {
    unpackRow(states, r, spins)
    let energy = ising.offset
    for (let i = 0; i < spins.length; i++) energy += linear[i]! * spins[i]!
    for (let k = 0; k < values.length; k++) energy += values[k]! * spins[rows[k]!]! * spins[cols[k]!]!
    return energy
  })
}

/**
 * Physical energy Σ h·s + Σ J·s·s of every row, in programmed units, without the programme's offset.
 * @throws RangeError for samples of another width
 */
export function physicalEnergies({ h, ends, J }: CouplingList, samples: Samples): Float64Array {
  requireWidth(samples, h.length)
  const spins = new Int8Array(h.length)
  return Float64Array.from({ length: samples.rows }, (_, r) => {
    unpackRow(samples, r, spins)
    let energy = 0
    for (let p = 0; p < spins.length; p++) energy += h[p]! * spins[p]!
    for (let c = 0; c < J.length; c++) energy += J[c]! * spins[ends[2 * c]!]! * spins[ends[2 * c + 1]!]!
    return energy
  })
}

export interface Solution {
  /** First row of the states that holds it. */
  readonly row: number
  readonly energy: number
  /** Reads that gave it. */
  readonly count: number
  /** Spins in which it differs from the best solution. */
  readonly distance: number
}

function hammingDistance(samples: Samples, a: number, b: number): number {
  const stride = strideOf(samples.width)
  let distance = 0
  for (let k = 0; k < stride; k++)
    for (let x = samples.bytes[a * stride + k]! ^ samples.bytes[b * stride + k]!; x; x &= x - 1) distance++
  return distance
}

/**
 * Distinct states with their counts, lowest energy first, then most often read, then first row.
 * @param energies one per row of `states`
 */
export function distinctSolutions(states: Samples, energies: Float64Array): Solution[] {
  if (energies.length !== states.rows) throw new RangeError(`${energies.length} energies for ${states.rows} rows`)
  const first = firstEqualRows(states)
  const counts = new Float64Array(states.rows)
  first.forEach((f, r) => (counts[f]! += states.counts[r]!))
  const order = [...first.filter((f, r) => f === r)].sort(
    (a, b) => energies[a]! - energies[b]! || counts[b]! - counts[a]! || a - b,
  )
  return order.map((row) => ({
    row,
    energy: energies[row]!,
    count: counts[row]!,
    distance: hammingDistance(states, row, order[0]!),
  }))
}

export interface Histogram {
  /** Lower edge of the first bin, a multiple of the step. */
  readonly start: number
  /** Width of a bin: 1, 2 or 5 times a power of ten. */
  readonly step: number
  /** Weight in [start + k·step, start + (k + 1)·step). */
  readonly counts: number[]
}

/** The smallest 1, 2 or 5 times a power of ten that is not below `width`. */
function niceStep(width: number): number {
  const exponent = Math.floor(Math.log10(width))
  for (const factor of [1, 2, 5]) {
    const step = exponent < 0 ? factor / 10 ** -exponent : factor * 10 ** exponent
    if (step >= width) return step
  }
  return exponent + 1 < 0 ? 1 / 10 ** (-exponent - 1) : 10 ** (exponent + 1)
}

/**
 * Weight of values in each of `bins` bins of width `step` from `start`, a multiple of the step but for rounding.
 * Every value must lie in one of them.
 */
export function weightsInBins(
  values: ArrayLike<number>,
  counts: ArrayLike<number>,
  { start, step, bins }: { start: number; step: number; bins: number },
): number[] {
  const firstBin = Math.round(start / step)
  const weights = new Array<number>(bins).fill(0)
  for (let k = 0; k < values.length; k++) weights[Math.floor(values[k]! / step) - firstBin]! += counts[k]!
  return weights
}

/**
 * Weighted histogram with readable bin edges, at most about `bins` bins (one more where the first edge lies below the
 * values). All values equal: one bin of width 1, or of a readable width that still tells such large values apart.
 * @throws RangeError for bins < 1, a value that is not finite or counts of another length
 */
export function histogram(values: ArrayLike<number>, counts: ArrayLike<number>, bins: number): Histogram {
  if (!(Number.isInteger(bins) && bins >= 1)) throw new RangeError(`bins must be a whole number from 1, not ${bins}`)
  if (counts.length !== values.length) throw new RangeError(`${counts.length} counts for ${values.length} values`)
  let least = Infinity
  let greatest = -Infinity
  for (let k = 0; k < values.length; k++) {
    if (!Number.isFinite(values[k]!)) throw new RangeError(`value ${k} is ${values[k]}`)
    least = Math.min(least, values[k]!)
    greatest = Math.max(greatest, values[k]!)
  }
  if (values.length === 0) return { start: 0, step: 1, counts: [] }
  // Below this width neighbouring bins would have the same edges in floating point.
  const finest = 4 * Number.EPSILON * Math.max(Math.abs(least), Math.abs(greatest))
  const step = greatest > least ? niceStep(Math.max((greatest - least) / bins, finest)) : niceStep(Math.max(1, finest))
  const firstBin = Math.floor(least / step)
  const start = firstBin * step
  const filled = Math.floor(greatest / step) - firstBin + 1
  return { start, step, counts: weightsInBins(values, counts, { start, step, bins: filled }) }
}
