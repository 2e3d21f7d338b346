import { createRandom, STREAMS } from '../random'
import type { SamplerModel } from './physical-model'

/*
 * One sweep of Metropolis updates (Metropolis, Rosenbluth, Rosenbluth, Teller & Teller, J. Chem. Phys. 21:1087, 1953) with
 * stored local fields. The test u < e^(−x) is settled exactly, mostly without an exponential: the top bits of u bracket
 * −ln u between two table entries, and only an x inside its bracket is compared in full.
 */
const TABLE_BITS = 12
const TABLE_SIZE = 2 ** TABLE_BITS
/** minusLog[k] = −ln(k / size); −ln u lies between entries k + 1 and k for u in [k, k + 1) / size. */
const minusLog = Float64Array.from({ length: TABLE_SIZE + 1 }, (_, k) =>
  k === 0 ? Infinity : -Math.log(k / TABLE_SIZE),
)
/** Beyond it e^(−x) is under the 2⁻³² resolution of u: no draw can accept. */
const HOPELESS = 32 * Math.LN2
const UNIT = 2 ** -32

/** Memory of one read, used again for the next: nothing is allocated in a sweep. */
export interface Walker {
  readonly spins: Float64Array
  /** h_i + Σ_j J_ij s_j. */
  readonly fields: Float64Array
  /** State of the generator (xoshiro128**, Blackman & Vigna 2021), kept here so that the sweep can hold it in locals. */
  readonly state: Int32Array
}

export function createWalker(n: number): Walker {
  return { spins: new Float64Array(n), fields: new Float64Array(n), state: new Int32Array(4) }
}

/** Starts read number `read`: its own random stream, independent random spins. */
export function startWalker(walker: Walker, model: SamplerModel, seed: number, read: number): void {
  const random = createRandom(seed, STREAMS.reads + read)
  const { spins, fields, state } = walker
  for (let i = 0; i < model.n; i++) spins[i] = random.uint32() & 0x80000000 ? 1 : -1
  for (let k = 0; k < 4; k++) state[k] = random.uint32()
  if ((state[0]! | state[1]! | state[2]! | state[3]!) === 0) state[3] = 1
  for (let i = 0; i < model.n; i++) {
    let field = model.h[i]!
    for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++)
      field += model.weights[p]! * spins[model.targets[p]!]!
    fields[i] = field
  }
}

/** Offers every spin one flip at the given inverse temperature, in order of index. */
export function sweep(walker: Walker, model: SamplerModel, inverseTemperature: number): void {
  const { n, offsets, targets, weights } = model
  const { spins, fields, state } = walker
  const factor = -2 * inverseTemperature
  let a = state[0]!
  let b = state[1]!
  let c = state[2]!
  let d = state[3]!
  for (let i = 0; i < n; i++) {
    const spin = spins[i]!
    const x = factor * spin * fields[i]!
    if (x > 0) {
      if (x >= HOPELESS) continue
      const product = Math.imul(b, 5)
      const draw = Math.imul((product << 7) | (product >>> 25), 9) >>> 0
      const shifted = b << 9
      c ^= a
      d ^= b
      b ^= c
      a ^= d
      c ^= shifted
      d = (d << 11) | (d >>> 21)
      const k = draw >>> (32 - TABLE_BITS)
      if (x > minusLog[k + 1]! && (x > minusLog[k]! || draw * UNIT >= Math.exp(-x))) continue
    }
    spins[i] = -spin
    const change = -2 * spin
    const end = offsets[i + 1]!
    for (let p = offsets[i]!; p < end; p++) fields[targets[p]!]! += change * weights[p]!
  }
  state[0] = a
  state[1] = b
  state[2] = c
  state[3] = d
}
