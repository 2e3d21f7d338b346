/** Least and greatest value that the machine takes; least ≤ 0 ≤ greatest. */
export type Range = readonly [number, number]

/** What the machine takes: fields, couplings, and the signed sum of couplings on a qubit where that is limited. */
export interface Ranges {
  readonly h: Range
  readonly J: Range
  readonly couplingSum: Range | null
}

export type RangeName = 'h' | 'J' | 'coupling sum'

/** Programmed values, or values before scaling, of a set of qubits. */
export interface Values {
  readonly h: Float64Array
  /** Positions in h, two per coupler. */
  readonly ends: Uint32Array
  readonly J: Float64Array
}

/** Values of one kind that leave their range. */
export interface Excess {
  readonly range: RangeName
  readonly limits: Range
  /** Least and greatest value there. */
  readonly least: number
  readonly greatest: number
  /** How many values lie outside. */
  readonly count: number
  /** Positions of qubits (h, coupling sum) or numbers of couplers (J) outside, the first ones only. */
  readonly first: readonly number[]
}

const DEFAULTS = { listed: 10 }

/** Signed sum of couplings on each qubit. */
export function couplingSums({ h, ends, J }: Values): Float64Array {
  const sums = new Float64Array(h.length)
  J.forEach((value, c) => {
    sums[ends[2 * c]!]! += value
    sums[ends[2 * c + 1]!]! += value
  })
  return sums
}

/** Each limited kind of value with its range. */
function limitedKinds(values: Values, ranges: Ranges): [RangeName, Range, Float64Array][] {
  const kinds: [RangeName, Range, Float64Array][] = [
    ['h', ranges.h, values.h],
    ['J', ranges.J, values.J],
  ]
  if (ranges.couplingSum) kinds.push(['coupling sum', ranges.couplingSum, couplingSums(values)])
  for (const [name, [least, greatest]] of kinds)
    if (!(least <= 0 && greatest >= 0)) throw new RangeError(`the ${name} range ${least} … ${greatest} does not hold 0`)
  return kinds
}

/**
 * The kinds of values that leave their ranges; empty when all fit.
 * @throws RangeError for a range that does not hold 0
 */
export function excessesOf(values: Values, ranges: Ranges): Excess[] {
  const excesses: Excess[] = []
  for (const [range, limits, list] of limitedKinds(values, ranges)) {
    const first: number[] = []
    let count = 0
    let least = Infinity
    let greatest = -Infinity
    list.forEach((value, k) => {
      least = Math.min(least, value)
      greatest = Math.max(greatest, value)
      if (value >= limits[0] && value <= limits[1]) return
      count++
      if (first.length < DEFAULTS.listed) first.push(k)
    })
    if (count > 0) excesses.push({ range, limits, least, greatest, count, first })
  }
  return excesses
}

/** The greatest factor ≤ 1 that brings every value into its range, and the range that asks for it; 0 if none does. */
export function fittingScale(values: Values, ranges: Ranges): { scale: number; limitedBy: RangeName | 'nothing' } {
  let scale = 1
  let limitedBy: RangeName | 'nothing' = 'nothing'
  for (const [range, [least, greatest], list] of limitedKinds(values, ranges)) {
    for (const value of list) {
      const factor = value > 0 ? greatest / value : value < 0 ? least / value : 1
      if (factor >= scale) continue
      scale = factor
      limitedBy = range
    }
  }
  return { scale, limitedBy }
}
