import { createRandom } from '../../shared/engine/random'
import { STRAIGHT } from '../../shared/engine/sampling/anneal-path'
import { assemblyLanes } from '../../shared/engine/sampling/lanes/assembly'
import { laneModel, LANES } from '../../shared/engine/sampling/lanes/lane-model'
import type { LaneKind } from '../../shared/engine/sampling/lanes/rounding'
import { createWalker, startWalker, sweep } from '../../shared/engine/sampling/metropolis'
import { pathIntegralReads } from '../../shared/engine/sampling/path-integral'
import { renumbered } from '../../shared/engine/sampling/physical-model'
import type { SamplerModel } from '../../shared/engine/sampling/physical-model'
import { shuffledOrder } from '../../shared/engine/sampling/visiting-order'

/** Runs one schedule of inverse temperatures from a random start. */
export interface Sampler {
  readonly name: string
  /** Replicas at once. */
  readonly lanes: number
  readonly run: (schedule: Float64Array, seed: number) => void
}

/** The engine's plain loop: stored local fields, no exponential but where a draw is close, no draw where none can accept. */
export function plainLoop(model: SamplerModel): Sampler {
  const shuffled = renumbered(model, shuffledOrder(model.n, 1))
  const walker = createWalker(model.n)
  return {
    name: 'plain loop',
    lanes: 1,
    run(schedule, seed) {
      startWalker(walker, shuffled, seed, 0)
      for (const beta of schedule) sweep(walker, shuffled, beta)
    },
  }
}

/** The loop as one would first write it: an exponential and a draw for every flip uphill. */
export function textbookLoop(model: SamplerModel): Sampler {
  const { n, h, offsets, targets, weights } = renumbered(model, shuffledOrder(model.n, 1))
  const spins = new Float64Array(n)
  const fields = new Float64Array(n)
  return {
    name: 'textbook loop',
    lanes: 1,
    run(schedule, seed) {
      const random = createRandom(seed)
      for (let i = 0; i < n; i++) spins[i] = random.float() < 0.5 ? 1 : -1
      for (let i = 0; i < n; i++) {
        fields[i] = h[i]!
        for (let p = offsets[i]!; p < offsets[i + 1]!; p++) fields[i]! += weights[p]! * spins[targets[p]!]!
      }
      for (const beta of schedule)
        for (let i = 0; i < n; i++) {
          const change = -2 * spins[i]! * fields[i]!
          if (change > 0 && random.float() >= Math.exp(-beta * change)) continue
          spins[i] = -spins[i]!
          for (let p = offsets[i]!; p < offsets[i + 1]!; p++) fields[targets[p]!]! += 2 * spins[i]! * weights[p]!
        }
    },
  }
}

export function laneSampler(model: SamplerModel, kind: LaneKind): Sampler {
  const lanes = assemblyLanes(laneModel(model, kind, 1))
  if (!lanes) throw new Error('this platform has no 128-bit vectors in WebAssembly')
  return {
    name: kind,
    lanes: LANES,
    run(schedule, seed) {
      const random = createRandom(seed)
      const words = Uint16Array.from({ length: model.n }, () => random.uint32() >>> 16)
      lanes.begin(words, random.uint32(), random.uint32() | 1)
      schedule.forEach((beta, k) => lanes.sweep(beta, k))
    },
  }
}

/** Path-integral Monte Carlo over a whole anneal at the temperature of 15 mK; its updates are those of single slices. */
export function pathIntegral(model: SamplerModel, slices: number): Sampler {
  const table = { s: [0, 0.5, 1], A: [8, 1.2, 0.001], B: [0.2, 4, 10] }
  return {
    name: `path integral, ${slices} slices`,
    lanes: slices,
    run(schedule, seed) {
      const options = { table, schedule: STRAIGHT, slices, sweeps: schedule.length, seed, temperature: 0.3125 }
      const control = { cancelled: () => false, report: () => undefined }
      pathIntegralReads(model, { ...options, reads: 1, firstRead: 0 }, control)
    },
  }
}
