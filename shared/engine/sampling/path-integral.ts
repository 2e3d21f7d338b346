import type { Control } from '../control'
import type { EnergyTable } from '../machine/energy-table'
import type { Random } from '../random'
import { createRandom, shuffle, STREAMS } from '../random'
import { energiesOfSweeps, requireSchedule } from './anneal-path'
import type { SchedulePoints } from './anneal-path'
import { ANNEAL_DEFAULTS, requireSweeps } from './annealing-schedule'
import type { AnnealProgress } from './annealing-schedule'
import { PATH_DEFAULTS } from './path-limits'
import type { SamplerModel } from './physical-model'
import { renumbered } from './physical-model'
import { strideOf } from './samples'
import type { Samples } from './samples'
import { shuffledOrder } from './visiting-order'

/** Links of slices are no stronger than this: e^(−4·16) is beyond any draw, and at A = 0 the formula has no end. */
const STRONGEST_LINK = 16
const UNIT = 2 ** -32
const HOPELESS = 32 * Math.LN2

export interface PathIntegralOptions {
  /** Sweeps of each read, 1 … 1,000,000: each offers every spin a flip in every slice, and one of all slices. */
  readonly sweeps: number
  /** Trotter slices P, 2 … 256. */
  readonly slices: number
  readonly seed: number
  /** kT / h in GHz, above 0. */
  readonly temperature: number
  readonly table: EnergyTable
  readonly schedule: SchedulePoints
}

/** World lines of one read: spin i in slice k is spins[i·P + k], with its local field h_i + Σ_j J_ij s_jk beside it. */
export interface World {
  readonly slices: number
  readonly spins: Int8Array
  readonly fields: Float64Array
  /** Order in which slices are visited, drawn anew for each sweep. */
  readonly order: Uint32Array
}

/** A world of random spins, every slice by itself: at s = 0 the transverse field knows no direction. */
export function createWorld(model: SamplerModel, slices: number, random: Random): World {
  const spins = Int8Array.from({ length: model.n * slices }, () => (random.uint32() & 0x80000000 ? 1 : -1))
  const fields = new Float64Array(model.n * slices)
  for (let i = 0; i < model.n; i++)
    for (let k = 0; k < slices; k++) {
      let field = model.h[i]!
      for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++)
        field += model.weights[p]! * spins[model.targets[p]! * slices + k]!
      fields[i * slices + k] = field
    }
  return { slices, spins, fields, order: Uint32Array.from({ length: slices }, (_, k) => k) }
}

/**
 * Strength K = −½ ln tanh(A / (2PT)) of the links between neighbouring slices, and weight b = B / (2PT) of the programmed
 * energy in each: the P-slice state has weight exp(−b Σ_k E(s_k) + K Σ_ik s_ik s_i,k+1).
 */
export function pathWeights(A: number, B: number, slices: number, temperature: number): { K: number; b: number } {
  const K = -0.5 * Math.log(Math.tanh(A / (2 * slices * temperature)))
  return { K: Math.min(K, STRONGEST_LINK), b: B / (2 * slices * temperature) }
}

function flip(world: World, model: SamplerModel, i: number, k: number): void {
  const { slices, spins, fields } = world
  const spin = spins[i * slices + k]!
  spins[i * slices + k] = -spin
  const change = -2 * spin
  for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++)
    fields[model.targets[p]! * slices + k]! += change * model.weights[p]!
}

const accepts = (cost: number, random: Random): boolean =>
  cost <= 0 || (cost < HOPELESS && random.uint32() * UNIT < Math.exp(-cost))

/** Offers every spin a flip in each slice, and then one in all slices at once, which carries it over a barrier as a whole. */
export function sweepWorld(
  world: World,
  model: SamplerModel,
  { K, b }: { K: number; b: number },
  random: Random,
): void {
  const { slices: P, spins, fields, order } = world
  shuffle(order, random)
  for (let i = 0; i < model.n; i++) {
    const line = i * P
    let together = 0
    for (const k of order) {
      const spin = spins[line + k]!
      const beside = spins[line + (k + 1 === P ? 0 : k + 1)]! + spins[line + (k === 0 ? P - 1 : k - 1)]!
      if (accepts(2 * spin * (K * beside - b * fields[line + k]!), random)) flip(world, model, i, k)
      together += spins[line + k]! * fields[line + k]!
    }
    if (accepts(-2 * b * together, random)) for (let k = 0; k < P; k++) flip(world, model, i, k)
  }
}

/** @throws RangeError for sweeps, slices or a temperature out of range, or a schedule that is none */
function requireOptions({ sweeps, slices, temperature, schedule }: PathIntegralOptions): void {
  requireSweeps(sweeps)
  if (!(Number.isInteger(slices) && slices >= 2 && slices <= PATH_DEFAULTS.mostSlices))
    throw new RangeError(`slices must be a whole number from 2 to ${PATH_DEFAULTS.mostSlices}, not ${slices}`)
  if (!(Number.isFinite(temperature) && temperature > 0))
    throw new RangeError(`a temperature must be above 0, not ${temperature}`)
  requireSchedule(schedule)
}

/**
 * Path-integral Monte Carlo along A(s) and B(s) (Martoňák, Santoro & Tosatti, Phys. Rev. B 66:094203, 2002): a second
 * classical stand-in for checking settings, not a forecast of the machine; sweeps are no time. Reads firstRead …
 * firstRead + reads − 1 of a run, each with its own random stream. A read gives one slice, drawn at random: all
 * slices have the same distribution, that of a measurement along z, while their mean would be no state at all.
 * Progress is reported after each read; a cancelled run returns the reads that are complete.
 * @throws RangeError for sweeps, slices or a temperature out of range, or a schedule that is none
 */
export function pathIntegralReads(
  model: SamplerModel,
  options: PathIntegralOptions & { readonly reads: number; readonly firstRead: number },
  control: Pick<Control<AnnealProgress>, 'cancelled' | 'report'>,
): Samples {
  requireOptions(options)
  const { reads, firstRead, slices, sweeps, seed, temperature } = options
  const { A, B } = energiesOfSweeps(options.schedule, options.table, sweeps)
  const order = shuffledOrder(model.n, seed)
  const shuffled = renumbered(model, order)
  const stride = strideOf(model.n)
  const bytes = new Uint8Array(reads * stride)
  const walk = (random: Random): World | null => {
    const world = createWorld(shuffled, slices, random)
    for (let k = 0; k < sweeps; k++) {
      if (k % ANNEAL_DEFAULTS.sweepsBetweenChecks === 0 && control.cancelled()) return null
      sweepWorld(world, shuffled, pathWeights(A[k]!, B[k]!, slices, temperature), random)
    }
    return world
  }
  let done = 0
  while (done < reads) {
    const random = createRandom(seed, STREAMS.reads + firstRead + done)
    const world = walk(random)
    if (!world) break
    const slice = random.below(slices)
    order.forEach((i, k) => {
      if (world.spins[k * slices + slice]! > 0) bytes[done * stride + (i >> 3)]! |= 1 << (i & 7)
    })
    done++
    control.report({ readsDone: done, reads })
  }
  return { width: model.n, rows: done, bytes: bytes.slice(0, done * stride), counts: new Uint32Array(done).fill(1) }
}
