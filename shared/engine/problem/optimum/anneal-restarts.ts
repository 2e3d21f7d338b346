/**
 * Simulated annealing with restarts (Kirkpatrick, Gelatt & Vecchi, Science 220, 1983): Metropolis sweeps with stored
 * local fields, temperatures falling geometrically between two that the problem itself gives, greedy descent at the end.
 * Each restart has a stream of random numbers of its own, so any cut of them over threads gives the same answer.
 */
import type { Control } from '../../control'
import { createWalker, startWalker, sweep } from '../../sampling/metropolis'
import type { Walker } from '../../sampling/metropolis'
import type { SamplerModel } from '../../sampling/physical-model'
import { samplerModel } from '../../sampling/physical-model'
import { toIsing } from '../convert'
import { energyOf } from '../energy'
import type { Problem } from '../problem'

const DEFAULTS = {
  /** The largest usual change of energy is taken uphill this often at the start, the smallest at the end. */
  firstChance: 0.5,
  lastChance: 0.001,
  /** Share of variables whose smallest coefficient may lie below what the last temperature is set for. */
  lowShare: 0.1,
  /** The last temperature is at least this share of the first. */
  leastRatio: 1e-5,
  sweepsBetweenChecks: 32,
}

export interface RestartOptions {
  /** Number of the first of these restarts within the run. */
  readonly first: number
  readonly restarts: number
  /** 1 or more; a sweep offers every variable one flip. */
  readonly sweeps: number
  readonly seed: number
}

/** The best state of some restarts. */
export interface AnnealedBest {
  /** Offset included. */
  readonly energy: number
  /** One byte a variable, 0 or 1. */
  readonly state: Uint8Array
  /** The restart that met it first, and how many of those done ended in that energy. */
  readonly restart: number
  readonly hits: number
  readonly done: number
}

/** Temperatures of the first and the last sweep. */
function temperatureRange({ n, h, offsets, weights }: SamplerModel): { first: number; last: number } {
  let usual = 0
  const smallest: number[] = []
  for (let i = 0; i < n; i++) {
    let squares = h[i]! ** 2
    let least = Math.abs(h[i]!) || Infinity
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      squares += weights[p]! ** 2
      if (weights[p] !== 0) least = Math.min(least, Math.abs(weights[p]!))
    }
    // Neighbours pull at random while it is hot, so their sum is about the root of the sum of squares.
    usual = Math.max(usual, 2 * Math.sqrt(squares))
    if (least < Infinity) smallest.push(2 * least)
  }
  if (usual === 0) return { first: 1, last: 1 }
  smallest.sort((a, b) => a - b)
  const low = smallest[Math.floor(DEFAULTS.lowShare * smallest.length)]!
  const first = usual / -Math.log(DEFAULTS.firstChance)
  return { first, last: Math.min(first, Math.max(low / -Math.log(DEFAULTS.lastChance), first * DEFAULTS.leastRatio)) }
}

/** Flips whatever lowers the energy until nothing does; ends because the energy falls with every flip. */
function descend({ spins, fields }: Walker, { n, offsets, targets, weights }: SamplerModel): void {
  for (let moved = true; moved;) {
    moved = false
    for (let i = 0; i < n; i++) {
      const gain = spins[i]! * fields[i]!
      // Rounding in a field near zero must not flip a spin to and fro.
      if (!(gain > 1e-12 * Math.abs(fields[i]!)) || gain < Number.MIN_VALUE) continue
      const change = -2 * spins[i]!
      spins[i] = -spins[i]!
      for (let p = offsets[i]!; p < offsets[i + 1]!; p++) fields[targets[p]!]! += change * weights[p]!
      moved = true
    }
  }
}

const samplerOf = (ising: Problem): SamplerModel => {
  const ends = new Uint32Array(2 * ising.values.length)
  for (let k = 0; k < ising.values.length; k++) {
    ends[2 * k] = ising.rows[k]!
    ends[2 * k + 1] = ising.cols[k]!
  }
  return samplerModel({ h: ising.linear, ends, J: ising.values })
}

/**
 * The best state of a QUBO over some restarts; of equal energies the first. A restart under way when it is cancelled is
 * ended by descent at once and counts. O(restarts · sweeps · n) tests and O(degree) for each flip.
 * @throws RangeError for fewer than one restart or sweep
 */
export function annealRestarts(
  qubo: Problem,
  { first, restarts, sweeps, seed }: RestartOptions,
  control: Control<{ done: number; energy: number }>,
): AnnealedBest {
  if (!(restarts >= 1 && sweeps >= 1)) throw new RangeError(`there are no ${restarts} restarts of ${sweeps} sweeps`)
  const model = samplerOf(toIsing(qubo))
  const walker = createWalker(model.n)
  const { first: hot, last: cold } = temperatureRange(model)
  let best: AnnealedBest | null = null
  for (let k = 0; k < restarts; k++) {
    startWalker(walker, model, seed, first + k)
    for (let t = 0; t < sweeps; t++) {
      if (t % DEFAULTS.sweepsBetweenChecks === 0 && control.cancelled()) break
      sweep(walker, model, (hot / cold) ** (sweeps === 1 ? 1 : t / (sweeps - 1)) / hot)
    }
    descend(walker, model)
    const state = Uint8Array.from(walker.spins, (spin) => (spin > 0 ? 1 : 0))
    const one = { energy: energyOf(qubo, state), state, restart: first + k, hits: 1, done: 1 }
    best = best ? mergeAnnealed([best, one]) : one
    control.report({ done: k + 1, energy: best.energy })
    if (control.cancelled()) break
  }
  return best!
}

/** The outcome of several sets of restarts, in the order given, as if they were one. */
export function mergeAnnealed(sets: readonly AnnealedBest[]): AnnealedBest {
  const energy = sets.reduce((least, set) => Math.min(least, set.energy), Infinity)
  const equal = sets.filter((set) => set.energy === energy)
  return {
    ...equal[0]!,
    hits: equal.reduce((sum, { hits }) => sum + hits, 0),
    done: sets.reduce((sum, { done }) => sum + done, 0),
  }
}
