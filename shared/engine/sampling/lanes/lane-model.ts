import type { SamplerModel } from '../physical-model'
import { renumbered } from '../physical-model'
import { levelledOrder } from '../visiting-order'
import type { LaneKind } from './rounding'
import { fitsLanes, stepOf } from './rounding'

/** Replicas that a kernel anneals at once: reads 16g … 16g + 15 of a run are group g. */
export const LANES = 16

/** The reads of as many whole groups as so many reads begin. */
export const wholeGroups = (reads: number): number => Math.ceil(reads / LANES) * LANES

/** A model in whole steps, its spins in the order of visits and cut into levels (visiting-order.ts). */
export interface LaneModel {
  readonly kind: LaneKind
  readonly n: number
  /** Spin k here is spin order[k] of the model. */
  readonly order: Uint32Array
  readonly levelStarts: Uint32Array
  /** Local fields with all spins down: H_k − Σ W_kj. */
  readonly fieldsDown: Int32Array
  readonly offsets: Uint32Array
  readonly targets: Uint32Array
  readonly weights: Int32Array
  /** Steps in a programmed unit. */
  readonly scale: number
}

/** @throws RangeError where a spin has too many neighbours for 16 bits */
export function laneModel(model: SamplerModel, kind: LaneKind, seed: number): LaneModel {
  if (!fitsLanes(model, kind)) throw new RangeError(`a spin has too many couplings for ${kind} fields`)
  const { order, starts } = levelledOrder(model, seed)
  const { n, h, offsets, targets, weights } = renumbered(model, order)
  const scale = 1 / stepOf(model, kind)
  const steps = Int32Array.from(weights, (weight) => Math.round(weight * scale))
  const fieldsDown = Int32Array.from(h, (field) => Math.round(field * scale))
  for (let k = 0; k < n; k++) for (let p = offsets[k]!; p < offsets[k + 1]!; p++) fieldsDown[k]! -= steps[p]!
  return { kind, n, order, levelStarts: starts, fieldsDown, offsets, targets, weights: steps, scale }
}

/** Sixteen replicas of one model under one generator. The assembly and the plain one give the same spins. */
export interface Lanes {
  /** Starts anew: bit l of words[k] is spin k of replica l, and x, y (not both 0) the generator's state. */
  begin(words: Uint16Array, x: number, y: number): void
  /** Offers every spin of every replica one flip; `index` is the number of the sweep. */
  sweep(inverseTemperature: number, index: number): void
  /** The spins as `begin` takes them. */
  spins(): Uint16Array
}
