import type { LaneModel, Lanes } from './lane-model'
import { LANES } from './lane-model'
import { factor32, sweep16, table16, table32 } from './thresholds'

/** ln(u)·T/2 in steps, by the place of u in its table. */
type Threshold = (place: number) => number

/** Thresholds of the 16-bit kernel: products are rounded to nearest, halves up, as its instruction does. */
function thresholds16(scale: number): (beta: number, index: number) => Threshold {
  const table = table16()
  return (beta, index) => {
    const { factor, doublings, bias } = sweep16(beta, scale, index)
    const times = 2 ** doublings
    return (place) => Math.max(Math.max(((table[place]! * factor + 0x4000) >> 15) * times, -0x8000) - bias, -0x8000)
  }
}

function thresholds32(scale: number): (beta: number) => Threshold {
  const table = table32()
  return (beta) => {
    const factor = factor32(beta, scale)
    return (place) => Math.fround(table[place]! * factor)
  }
}

const rotateLeft = (x: number, k: number): number => (x << k) | (x >>> (32 - k))

/**
 * The kernels of kernels/sweep-16.as and kernels/sweep-32.as in plain code, one replica after the other: what they are
 * checked against, and what runs where the platform lacks them. Fields are whole numbers that both hold exactly.
 */
export function plainLanes(model: LaneModel): Lanes {
  const { kind, n, fieldsDown, offsets, targets, weights, scale } = model
  const spins = new Int8Array(n * LANES)
  const fields = new Float64Array(n * LANES)
  const thresholdsOf = kind === '16-bit' ? thresholds16(scale) : thresholds32(scale)
  let x = 0
  let y = 0
  const flip = (k: number, lane: number): void => {
    const spin = spins[k * LANES + lane]!
    spins[k * LANES + lane] = -spin
    for (let p = offsets[k]!; p < offsets[k + 1]!; p++) fields[targets[p]! * LANES + lane]! -= 2 * spin * weights[p]!
  }
  return {
    begin(words, firstX, firstY) {
      x = firstX | 0
      y = firstY | 0
      spins.fill(-1)
      fieldsDown.forEach((field, k) => fields.fill(field, k * LANES, (k + 1) * LANES))
      words.forEach((word, k) => {
        for (let lane = 0; lane < LANES; lane++) if ((word >> lane) & 1) flip(k, lane)
      })
    },
    sweep(beta, index) {
      const threshold = thresholdsOf(beta, index)
      for (let k = 0; k < n; k++) {
        // xoroshiro64** (Blackman & Vigna, ACM TOMS 47:36, 2021).
        const draw = Math.imul(rotateLeft(Math.imul(x, 0x9e3779bb), 5), 5)
        y ^= x
        x = rotateLeft(x, 26) ^ y ^ (y << 9)
        y = rotateLeft(y, 13)
        const places = [draw >>> 16, draw & 0xffff]
        for (let lane = 0; lane < LANES; lane++) {
          const at = k * LANES + lane
          if (spins[at]! * fields[at]! > threshold(places[lane >> 3]! + (lane & 7))) flip(k, lane)
        }
      }
    },
    spins: () =>
      Uint16Array.from({ length: n }, (_, k) => {
        let word = 0
        for (let lane = 0; lane < LANES; lane++) if (spins[k * LANES + lane]! > 0) word |= 1 << lane
        return word
      }),
  }
}
