import type { Problem } from '../problem/problem'
import type { Programmed } from '../programming/programme'
import { createRandom, STREAMS } from '../random'
import type { Random } from '../random'
import { strideOf, unpackRow } from '../sampling/samples'
import type { Samples } from '../sampling/samples'
import { forEachRowBreaks } from './breaks'
import { Descent } from './descend'
import { logicalModel } from './local-fields'

/**
 * - majority: the sign of most qubits of a chain; a tie is settled by a coin;
 * - discard: rows with any broken chain are dropped;
 * - descent: majority, then greedy descent on the logical problem.
 */
export type DecodeMethod = 'majority' | 'discard' | 'descent'

export interface DecodeInput {
  /** Physical samples in the order of `programmed.qubits`, with any gauge undone. */
  readonly samples: Samples
  readonly programmed: Programmed
  readonly method: DecodeMethod
  /** Of the coins; each row has its own stream. */
  readonly seed: number
  /** The logical problem in Ising form. */
  readonly ising: Problem
}

export interface Decoded {
  /** Logical states, width n, one row per row kept, with its count. */
  readonly states: Samples
  /** Row of `samples` behind each row of `states`. */
  readonly kept: Uint32Array
  /** Chains settled by a coin, over all reads (rows weighted by their counts). */
  readonly ties: number
}

/** Flips that gain less than this share of the largest coefficient are rounding, not gain: descent always ends. */
const DEFAULTS = { leastGain: 1e-12 }

function descentOn(ising: Problem): Descent {
  const sizeOf = (values: Float64Array): number => values.reduce((most, v) => Math.max(most, Math.abs(v)), 0)
  const largest = Math.max(sizeOf(ising.linear), sizeOf(ising.values))
  return new Descent(logicalModel(ising), DEFAULTS.leastGain * largest)
}

/** Sum of the spins of each chain. */
function writeChainSums(spins: Int8Array, chainOf: Uint32Array, sums: Int32Array): void {
  sums.fill(0)
  for (let p = 0; p < chainOf.length; p++) sums[chainOf[p]!]! += spins[p]!
}

/** Signs of the sums; zeros by coin, in order of variables. Returns the number of coins. */
function settle(sums: Int32Array, spins: Int8Array, coins: () => Random): number {
  let ties = 0
  let random: Random | null = null
  for (let i = 0; i < sums.length; i++) {
    if (sums[i] === 0) {
      random ??= coins()
      spins[i] = random.uint32() & 0x80000000 ? 1 : -1
      ties++
    } else spins[i] = sums[i]! > 0 ? 1 : -1
  }
  return ties
}

function requireFit({ samples, programmed, ising }: DecodeInput): void {
  if (samples.width !== programmed.chainOf.length)
    throw new RangeError(`samples of ${samples.width} qubits for a programme of ${programmed.chainOf.length}`)
  if (programmed.chainStrength.length !== ising.n)
    throw new RangeError(`a programme of ${programmed.chainStrength.length} variables for a problem of ${ising.n}`)
}

/** Rows to decode: all, or those without a broken chain. */
function rowsToKeep({ samples, programmed, method }: DecodeInput): Uint32Array {
  if (method !== 'discard') return Uint32Array.from({ length: samples.rows }, (_, r) => r)
  const kept: number[] = []
  forEachRowBreaks(samples, programmed, (r, _broken, brokenCount) => {
    if (brokenCount === 0) kept.push(r)
  })
  return Uint32Array.from(kept)
}

/**
 * Logical states from physical samples (docs/formulas.md, Returned samples). The same input gives the same bytes; the
 * coins of a row depend on the seed and its number alone.
 * @throws RangeError where samples, programme and problem differ in size
 */
export function decode(input: DecodeInput): Decoded {
  requireFit(input)
  const { samples, programmed, method, seed, ising } = input
  const kept = rowsToKeep(input)
  const stride = strideOf(ising.n)
  const bytes = new Uint8Array(kept.length * stride)
  const counts = Uint32Array.from(kept, (r) => samples.counts[r]!)
  const sums = new Int32Array(ising.n)
  const physical = new Int8Array(samples.width)
  const spins = new Int8Array(ising.n)
  const descent = method === 'descent' ? descentOn(ising) : null
  let ties = 0
  kept.forEach((r, row) => {
    unpackRow(samples, r, physical)
    writeChainSums(physical, programmed.chainOf, sums)
    ties += settle(sums, spins, () => createRandom(seed, STREAMS.coins + r)) * counts[row]!
    descent?.run(spins)
    for (let i = 0; i < ising.n; i++) if (spins[i]! > 0) bytes[row * stride + (i >> 3)]! |= 1 << (i & 7)
  })
  return { states: { width: ising.n, rows: kept.length, bytes, counts }, kept, ties }
}
