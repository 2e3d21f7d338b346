import { largestLocalField } from '../annealing-schedule'
import type { SamplerModel } from '../physical-model'

/** How the lanes of a kernel hold fields: whole steps in 16-bit integers, or in 32-bit floating point, which are exact below 2²⁴. */
export type LaneKind = '16-bit' | '32-bit'

/** Steps of the largest local field; what is above them up to the capacity is room for rounding. */
const STEPS: Readonly<Record<LaneKind, { readonly largest: number; readonly capacity: number }>> = {
  '16-bit': { largest: 32_000, capacity: 32_767 },
  '32-bit': { largest: 2 ** 23, capacity: 2 ** 24 },
}

/**
 * The size of a step in programmed units: the largest local field divided by 32,000 or 2²³. Fields and couplings are
 * rounded to whole steps, so none is off by more than half of one.
 */
export function stepOf(model: SamplerModel, kind: LaneKind): number {
  return (largestLocalField(model) || 1) / STEPS[kind].largest
}

/** True where the field of every spin fits its lane even if all its couplings are rounded away from zero. */
export function fitsLanes(model: SamplerModel, kind: LaneKind): boolean {
  let most = 0
  for (let i = 0; i < model.n; i++) most = Math.max(most, model.offsets[i + 1]! - model.offsets[i]!)
  return STEPS[kind].largest + (most + 1) / 2 <= STEPS[kind].capacity
}
