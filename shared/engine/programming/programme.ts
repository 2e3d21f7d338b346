import { layOut } from './layout'
import type { Layout, LayoutInput } from './layout'
import type { Problem } from '../problem/problem'
import { excessesOf, fittingScale } from './ranges'
import type { Excess, RangeName, Ranges, Values } from './ranges'

export type { Excess, RangeName, Ranges } from './ranges'

/** What is put on a problem that is laid out. */
export interface LayoutProgramme {
  /** Chain strength k_i of every variable, in logical units; `perChain` of `chainStrengths`. */
  readonly strengths: Float64Array
  readonly ranges: Ranges
  /** `fit` (default): the greatest factor ≤ 1 that fits the ranges. A number is taken as it is, also above 1. */
  readonly scale?: 'fit' | number
}

export type ProgrammeInput = LayoutInput & LayoutProgramme

/**
 * What the machine is given. A *position* is an index into `qubits`.
 * scale·E_logical = E_physical + offset on every state whose chains are unbroken, where E_logical includes the
 * problem's own offset and E_physical = Σ h·s + Σ J·s·s.
 */
export interface Programmed {
  /** Used dense qubit indices of the machine graph, ascending. */
  readonly qubits: Uint32Array
  /** Programmed field of each position. */
  readonly h: Float64Array
  /** Positions joined by each coupler, two per coupler, lower first; couplers in order of machine edges. */
  readonly ends: Uint32Array
  /** Programmed coupling of each coupler. */
  readonly J: Float64Array
  readonly isChainCoupler: Uint8Array
  readonly scale: number
  readonly offset: number
  /** The range that keeps a fitted scale below 1. */
  readonly limitedBy: 'nothing' | RangeName
  /** Per variable, in logical units. */
  readonly chainStrength: Float64Array
  /** Variable of each position. */
  readonly chainOf: Uint32Array
}

/** Either programmed values, or what would leave the machine's ranges (values after scaling). */
export type ProgrammeResult =
  | { readonly programmed: Programmed; readonly excesses: null }
  | { readonly programmed: null; readonly excesses: readonly Excess[] }

/** Chain couplings put in, still in logical units. Adding 0 turns −0 into 0. */
function withChainCouplings(layout: Layout, strengths: Float64Array): Values {
  const J = layout.J.map((share, c) =>
    layout.isChainCoupler[c] ? 0 - strengths[layout.chainOf[layout.ends[2 * c]!]!]! : share + 0,
  )
  return { h: layout.h.map((field) => field + 0), ends: layout.ends, J }
}

const scaled = (values: Values, factor: number): Values => ({
  h: values.h.map((v) => v * factor + 0),
  ends: values.ends,
  J: values.J.map((v) => v * factor + 0),
})

/** The fitted factor, lowered by the few units in the last place by which rounding may leave a range. */
function fitted(values: Values, ranges: Ranges): { scale: number; limitedBy: RangeName | 'nothing' } {
  const { scale, limitedBy } = fittingScale(values, ranges)
  let safe = scale
  for (let shrink = Number.EPSILON; safe > 0 && excessesOf(scaled(values, safe), ranges).length > 0; shrink *= 2)
    safe = scale * (1 - shrink)
  return { scale: safe, limitedBy }
}

function requireStrengths(strengths: Float64Array, n: number): void {
  if (strengths.length !== n) throw new RangeError(`${strengths.length} chain strengths for ${n} chains`)
  const bad = strengths.findIndex((k) => !(Number.isFinite(k) && k >= 0))
  if (bad >= 0) throw new RangeError(`the strength of chain ${bad} is ${strengths[bad]}, not a number from 0 upwards`)
}

/**
 * Programmed fields and couplings of an embedded problem: fields and interactions split over the chains, −k_i on the chain
 * couplers, one factor for all (docs/formulas.md, From embedding to programmed values). A pure function: the same input
 * gives the same bytes. A scale that leaves the ranges is refused in the result.
 * @throws RangeError for an embedding that does not fit, negative strengths, a scale ≤ 0 or a range without 0
 */
export function programme(input: ProgrammeInput): ProgrammeResult {
  return programmeLayout(layOut(input), input.ising, input)
}

/** The same for a problem that is laid out already. */
export function programmeLayout(layout: Layout, ising: Problem, given: LayoutProgramme): ProgrammeResult {
  const { strengths, ranges, scale: asked = 'fit' } = given
  requireStrengths(strengths, ising.n)
  if (asked !== 'fit' && !(Number.isFinite(asked) && asked > 0))
    throw new RangeError(`the scale must be a positive number, not ${asked}`)
  const logical = withChainCouplings(layout, strengths)
  const { scale, limitedBy } =
    asked === 'fit' ? fitted(logical, ranges) : { scale: asked, limitedBy: 'nothing' as const }
  if (scale === 0) return { programmed: null, excesses: excessesOf(logical, ranges) }
  const values = scaled(logical, scale)
  const excesses = excessesOf(values, ranges)
  if (excesses.length > 0) return { programmed: null, excesses }
  const chainTerm = strengths.reduce((sum, k, i) => sum + k * layout.chainCouplerCount[i]!, 0)
  const programmed: Programmed = {
    qubits: layout.qubits,
    ...values,
    isChainCoupler: layout.isChainCoupler,
    scale,
    offset: scale * (ising.offset + chainTerm) + 0,
    limitedBy,
    chainStrength: strengths.slice(),
    chainOf: layout.chainOf,
  }
  return { programmed, excesses: null }
}
