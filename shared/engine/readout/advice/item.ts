import { wilson } from '../intervals'
import type { ChainEvidence } from './evidence'

/** What to change, in terms of a run sheet, or where to look where a run sheet cannot mend it. */
export type AdviceAction =
  /** Raise k of these variables to their cut bound times a margin. */
  | { readonly set: 'strength of chains'; readonly variables: readonly number[]; readonly margin: number }
  | { readonly set: 'strength of all'; readonly factor: number }
  | { readonly set: 'gauges'; readonly to: number }
  | { readonly set: 'reads'; readonly to: number }
  | { readonly set: 'interaction couplers'; readonly to: 'one' }
  | { readonly set: 'scale'; readonly to: 'fit' }
  | { readonly set: 'pause'; readonly s: number }
  | { readonly look: 'embedding'; readonly variables: readonly number[] }
  | {
      readonly look: 'machine'
      readonly qubits: readonly number[]
      readonly couplers: readonly (readonly [number, number])[]
    }
  | { readonly look: 'coefficients' }
  | { readonly look: 'groups'; readonly groups: readonly string[] }

export const ADVICE_KINDS = [
  'raise-named',
  'suspects',
  'raise-all',
  'weak-penalties',
  're-embed',
  'scale',
  'lower-all',
  'precision',
  'more-gauges',
  'strong-penalties',
  'more-reads',
  'pause',
] as const
export type AdviceKind = (typeof ADVICE_KINDS)[number]

/** One number that the advice rests on. */
export interface AdviceFigure {
  /** What it is and where it is seen: `x7 breaks`, `other chains break`. */
  readonly name: string
  readonly value: number
  /** Ends of its 95 % interval. */
  readonly low?: number
  readonly high?: number
  readonly unit: 'share' | 'count' | 'number' | 'energy' | 'GHz' | 'chance'
}

export interface AdviceItem {
  readonly kind: AdviceKind
  /** The greater, the sooner it should be done: the rank of its kind, and within it how much it concerns. */
  readonly weight: number
  readonly action: AdviceAction
  /** Why, in a sentence or two. */
  readonly sentence: string
  readonly evidence: readonly AdviceFigure[]
}

/**
 * Ranks: first what makes answers wrong and can be named, then what makes them worse everywhere, then what makes them
 * rare. The order is ours.
 */
export const RANKS: Record<AdviceKind, number> = {
  'raise-named': 11,
  suspects: 10,
  'raise-all': 9,
  'weak-penalties': 8,
  're-embed': 7,
  scale: 6,
  'lower-all': 5,
  precision: 4,
  'more-gauges': 3,
  'strong-penalties': 2,
  'more-reads': 1,
  pause: 0,
}

/** @param concern 0 … 1, how much of what happened it concerns */
export const weightOf = (kind: AdviceKind, concern: number): number => RANKS[kind] + Math.min(1, Math.max(0, concern))

/** A share of reads with its Wilson interval. */
export const shareFigure = (name: string, count: number, total: number): AdviceFigure => ({
  name,
  value: total > 0 ? count / total : 0,
  ...wilson(count, total),
  unit: 'share',
})

export const breaksOf = (chains: readonly ChainEvidence[]): number =>
  chains.reduce((sum, { breaks }) => sum + breaks, 0)

/** At most so many names are said in a sentence. */
const MOST_NAMED = 6

/** `a, b and c`, or `a, b, c, d, e, f and 3 more`. */
export function namesOf(names: readonly string[]): string {
  const said = names.slice(0, MOST_NAMED)
  const more = names.length - said.length
  if (more > 0) return `${said.join(', ')} and ${more} more`
  return said.length > 1 ? `${said.slice(0, -1).join(', ')} and ${said.at(-1)}` : (said[0] ?? '')
}
