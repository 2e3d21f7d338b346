import type { KernelChoice } from '../../assembly'
import type { Control } from '../../control'
import { createRandom, STREAMS } from '../../random'
import { ANNEAL_DEFAULTS, annealSchedule } from '../annealing-schedule'
import type { AnnealOptions, AnnealProgress } from '../annealing-schedule'
import type { SamplerModel } from '../physical-model'
import { strideOf } from '../samples'
import type { Samples } from '../samples'
import { assemblyLanes } from './assembly'
import type { LaneModel, Lanes } from './lane-model'
import { laneModel, LANES } from './lane-model'
import { plainLanes } from './plain'
import type { LaneKind } from './rounding'

/** One group of replicas from a random start; false when it was given up. */
function annealGroup(
  lanes: Lanes,
  schedule: Float64Array,
  start: { readonly n: number; readonly seed: number; readonly group: number },
  cancelled: () => boolean,
): boolean {
  const random = createRandom(start.seed, STREAMS.groups + start.group)
  const words = Uint16Array.from({ length: start.n }, () => random.uint32() >>> 16)
  lanes.begin(words, random.uint32(), random.uint32() | 1)
  for (let k = 0; k < schedule.length; k++) {
    if (k % ANNEAL_DEFAULTS.sweepsBetweenChecks === 0 && cancelled()) return false
    lanes.sweep(schedule[k]!, k)
  }
  return true
}

/** Writes replicas `from` … `to` − 1 as rows, the first of them as row `row`. */
function unpack(
  words: Uint16Array,
  order: Uint32Array,
  bytes: Uint8Array,
  row: number,
  from: number,
  to: number,
): void {
  const stride = strideOf(order.length)
  order.forEach((i, k) => {
    for (let lane = from; lane < to; lane++)
      if ((words[k]! >> lane) & 1) bytes[(row + lane - from) * stride + (i >> 3)]! |= 1 << (i & 7)
  })
}

function lanesFor(model: LaneModel, choice: KernelChoice): Lanes {
  return (choice === 'assembly' ? assemblyLanes(model) : null) ?? plainLanes(model)
}

/**
 * Reads firstRead … firstRead + reads − 1 of a run, as `anneal` does but sixteen at once and in whole steps
 * (rounding.ts). Groups of sixteen reads are numbered from read 0 of the run and each has its own random stream, so however a run
 * is cut into ranges the rows are the same; of a group that is asked for in part the whole is computed.
 * Progress is reported after each group; a cancelled run returns the reads that are complete.
 * @throws RangeError for sweeps outside 1 … 1,000,000, a temperature that is not positive, or too many couplings at a spin
 */
export function annealLanes(
  model: SamplerModel,
  options: AnnealOptions & {
    readonly reads: number
    readonly firstRead: number
    readonly kind: LaneKind
    readonly choice: KernelChoice
  },
  control: Pick<Control<AnnealProgress>, 'cancelled' | 'report'>,
): Samples {
  const { reads, firstRead, kind, choice, seed } = options
  const schedule = annealSchedule(model, options)
  const inSteps = laneModel(model, kind, seed)
  const stride = strideOf(model.n)
  const bytes = new Uint8Array(reads * stride)
  const lanes = reads > 0 ? lanesFor(inSteps, choice) : null
  let done = 0
  while (lanes && done < reads) {
    const group = Math.floor((firstRead + done) / LANES)
    if (!annealGroup(lanes, schedule, { n: model.n, seed, group }, control.cancelled)) break
    const from = firstRead + done - group * LANES
    const to = Math.min(LANES, from + reads - done)
    unpack(lanes.spins(), inSteps.order, bytes, done, from, to)
    done += to - from
    control.report({ readsDone: done, reads })
  }
  return { width: model.n, rows: done, bytes: bytes.slice(0, done * stride), counts: new Uint32Array(done).fill(1) }
}
