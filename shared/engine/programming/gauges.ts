import { createRandom, STREAMS } from '../random'
import { strideOf } from '../sampling/samples'
import type { SampleRows, Samples } from '../sampling/samples'
import type { Programmed } from './programme'
import { excessesOf } from './ranges'
import type { Ranges } from './ranges'

/** +1 or −1 for each position of the programmed problem. */
export type Gauge = Int8Array

/** `qubit`: every qubit has its own sign. `chain`: one sign per chain, so that chain couplings keep theirs. */
export type GaugeKind = 'qubit' | 'chain'

/**
 * A random spin reversal. Gauge `number` of a seed does not depend on how many are drawn.
 * Where the coupling range is asymmetric, a `qubit` gauge turns strong chain couplings positive and may leave the range:
 * check with `excessesOf`, or draw `chain` gauges.
 */
export function drawGauge(programmed: Programmed, seed: number, number: number, kind: GaugeKind = 'qubit'): Gauge {
  const random = createRandom(seed, STREAMS.gauges + number)
  const drawn = kind === 'chain' ? programmed.chainStrength.length : programmed.qubits.length
  const signs = Int8Array.from({ length: drawn }, () => (random.uint32() & 0x80000000 ? 1 : -1))
  return kind === 'chain' ? Int8Array.from(programmed.chainOf, (i) => signs[i]!) : signs
}

/**
 * The problem after the spin reversal: h → t·h, J → t·t·J (docs/formulas.md, From embedding to programmed values). Offset
 * and scale stay: state t·s of it has the energy that state s had.
 * @throws RangeError for a gauge of another length
 */
export function applyGauge(programmed: Programmed, gauge: Gauge): Programmed {
  if (gauge.length !== programmed.h.length)
    throw new RangeError(`${gauge.length} signs for ${programmed.h.length} qubits`)
  const { ends } = programmed
  return {
    ...programmed,
    h: programmed.h.map((field, p) => field * gauge[p]! + 0),
    J: programmed.J.map((J, c) => J * gauge[ends[2 * c]!]! * gauge[ends[2 * c + 1]!]! + 0),
  }
}

/** Bits of a packed row that a gauge turns. @throws RangeError for a gauge of another length */
function reversedBits(gauge: Gauge, width: number): Uint8Array {
  if (gauge.length !== width) throw new RangeError(`${gauge.length} signs for samples of width ${width}`)
  const reversed = new Uint8Array(strideOf(width))
  gauge.forEach((sign, p) => {
    if (sign < 0) reversed[p >> 3]! |= 1 << (p & 7)
  })
  return reversed
}

/**
 * Samples read under a gauge, turned back to t·s.
 * @throws RangeError for a gauge of another length
 */
export function undoGauge(samples: Samples, gauge: Gauge): Samples {
  const stride = strideOf(samples.width)
  const reversed = reversedBits(gauge, samples.width)
  const bytes = samples.bytes.map((byte, k) => byte ^ reversed[k % stride]!)
  return { ...samples, bytes }
}

/**
 * Rows that were each read under the gauge of their number, turned back.
 * @param signsOf signs of a gauge by its number in `samples.gauges`
 * @throws RangeError for a gauge of another length
 */
export function undoGauges<T extends SampleRows>(samples: T, signsOf: (gauge: number) => Gauge): T {
  const { gauges, rows } = samples
  if (!gauges) return samples
  const stride = strideOf(samples.width)
  const reversed = new Map<number, Uint8Array>()
  const bytes = samples.bytes.slice()
  for (let r = 0; r < rows; r++) {
    const number = gauges[r]!
    const mask = reversed.get(number) ?? reversedBits(signsOf(number), samples.width)
    reversed.set(number, mask)
    for (let k = 0; k < stride; k++) bytes[r * stride + k]! ^= mask[k]!
  }
  return { ...samples, bytes }
}

/**
 * How many of the first `gauges` gauges of a seed, drawn a sign a chain, turn some field, interaction coupling or
 * coupling sum out of an asymmetric range.
 * @throws RangeError for a range that does not hold 0
 */
export function gaugesOutsideRanges(programmed: Programmed, ranges: Ranges, seed: number, gauges: number): number {
  const isMirrored = ([least, greatest]: readonly [number, number]): boolean => least === -greatest
  if (isMirrored(ranges.h) && isMirrored(ranges.J) && !ranges.couplingSum) return 0
  let outside = 0
  for (let number = 0; number < gauges; number++) {
    const turned = applyGauge(programmed, drawGauge(programmed, seed, number, 'chain'))
    if (excessesOf(turned, ranges).length > 0) outside++
  }
  return outside
}
