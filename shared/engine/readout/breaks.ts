import type { Programmed } from '../programming/programme'
import { unpackRow } from '../sampling/samples'
import type { Samples } from '../sampling/samples'

/** Every number is of reads: rows weighted by their counts. Only chains of two or more qubits can break. */
export interface BreakStatistics {
  readonly reads: number
  readonly perChain: {
    /** Reads in which each chain is broken. Length: variables. */
    readonly breaks: Uint32Array
  }
  readonly perRead: {
    /** Broken chains of each row. */
    readonly brokenChains: Uint16Array
    /** histogram[b] reads have b broken chains; ends at the largest b that occurs. */
    readonly histogram: number[]
  }
  /** Reads in which the ends of each coupler disagree; in the order of the programmed couplers, 0 on interaction couplers. */
  readonly perCoupler: Uint32Array
  /** Reads in which each qubit disagrees with the majority of its chain; an even split counts against none. */
  readonly perQubit: Uint32Array
  readonly readsWithBreak: number
  /** Reads × chains of two or more qubits: what a break fraction is taken of. */
  readonly chainReads: number
}

/** Marks per row and variable whether the qubits of the chain disagree: calls back with each row's broken chains. */
export function forEachRowBreaks(
  samples: Samples,
  programmed: Programmed,
  visit: (row: number, broken: Uint8Array, brokenCount: number) => void,
): void {
  const { chainOf, chainStrength } = programmed
  if (samples.width !== chainOf.length)
    throw new RangeError(`samples of ${samples.width} qubits for a programme of ${chainOf.length}`)
  const firstSpin = new Int8Array(chainStrength.length)
  const broken = new Uint8Array(chainStrength.length)
  const spins = new Int8Array(samples.width)
  for (let r = 0; r < samples.rows; r++) {
    firstSpin.fill(0)
    broken.fill(0)
    unpackRow(samples, r, spins)
    let brokenCount = 0
    for (let p = 0; p < chainOf.length; p++) {
      const i = chainOf[p]!
      const spin = spins[p]!
      if (firstSpin[i] === 0) firstSpin[i] = spin
      else if (firstSpin[i] !== spin && !broken[i]) {
        broken[i] = 1
        brokenCount++
      }
    }
    visit(r, broken, brokenCount)
  }
}

/** Number of qubits of each chain. */
export function chainLengths({ chainOf, chainStrength }: Programmed): Uint32Array {
  const lengths = new Uint32Array(chainStrength.length)
  for (const i of chainOf) lengths[i]!++
  return lengths
}

function disagreements(samples: Samples, { ends, isChainCoupler }: Programmed): Uint32Array {
  const perCoupler = new Uint32Array(isChainCoupler.length)
  const chainCouplers = Uint32Array.from(isChainCoupler.keys()).filter((c) => isChainCoupler[c])
  const spins = new Int8Array(samples.width)
  for (let r = 0; r < samples.rows; r++) {
    unpackRow(samples, r, spins)
    const count = samples.counts[r]!
    for (let k = 0; k < chainCouplers.length; k++) {
      const c = chainCouplers[k]!
      if (spins[ends[2 * c]!] !== spins[ends[2 * c + 1]!]) perCoupler[c]! += count
    }
  }
  return perCoupler
}

/** Reads in which each position is on the lesser side of its chain; an even split has none. */
function minorities(samples: Samples, programmed: Programmed): Uint32Array {
  const { chainOf, chainStrength } = programmed
  const lengths = chainLengths(programmed)
  const breaks = new Uint32Array(chainOf.length)
  const ups = new Int32Array(chainStrength.length)
  const spins = new Int8Array(samples.width)
  for (let r = 0; r < samples.rows; r++) {
    ups.fill(0)
    unpackRow(samples, r, spins)
    for (let p = 0; p < chainOf.length; p++) if (spins[p]! > 0) ups[chainOf[p]!]!++
    for (let p = 0; p < chainOf.length; p++) {
      const up = ups[chainOf[p]!]!
      const length = lengths[chainOf[p]!]!
      if (up === 0 || up === length || 2 * up === length) continue
      if (spins[p]! > 0 !== 2 * up > length) breaks[p]! += samples.counts[r]!
    }
  }
  return breaks
}

/**
 * Where chains broke: a chain is broken in a read when its qubits disagree (docs/formulas.md, Returned samples).
 * @param samples physical samples in the order of `programmed.qubits`, with any gauge undone
 * @throws RangeError for samples of another width
 */
export function breakStatistics(input: {
  readonly samples: Samples
  readonly programmed: Programmed
}): BreakStatistics {
  const { samples, programmed } = input
  const breaks = new Uint32Array(programmed.chainStrength.length)
  const brokenChains = new Uint16Array(samples.rows)
  const histogram: number[] = [0]
  let reads = 0
  forEachRowBreaks(samples, programmed, (r, broken, brokenCount) => {
    const count = samples.counts[r]!
    reads += count
    brokenChains[r] = brokenCount
    while (histogram.length <= brokenCount) histogram.push(0)
    histogram[brokenCount]! += count
    if (brokenCount > 0) broken.forEach((flag, i) => (breaks[i]! += flag * count))
  })
  const chains = chainLengths(programmed).filter((length) => length > 1).length
  return {
    reads,
    perChain: { breaks },
    perRead: { brokenChains, histogram },
    perCoupler: disagreements(samples, programmed),
    perQubit: minorities(samples, programmed),
    readsWithBreak: reads - histogram[0]!,
    chainReads: reads * chains,
  }
}
