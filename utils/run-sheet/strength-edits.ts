import type { ChainRow, RuleView, RunSheetView } from '#shared/schemas/run-sheets'
import type { StrengthDraft } from './draft'
import { isBreakable } from './chains'

/** Strengths of single chains, as they are edited in the table of chains. */

export type StrengthEdit =
  | { readonly to: 'value'; readonly k: number }
  | { readonly to: 'multiple'; readonly factor: number }
  | { readonly to: 'bound'; readonly margin: number }
  /** Back to what a rule gives each chain. */
  | { readonly to: 'rule'; readonly rule: RuleView }
  /** Back to the strength that chains without one of their own share. */
  | { readonly to: 'shared' }

/** What the strengths of chains are reckoned from. */
export interface StrengthGround {
  readonly maxAbsJ: number
  readonly leastShare: number
}

export const groundOf = ({ maxAbsJ, ising }: RunSheetView): StrengthGround => ({
  maxAbsJ,
  leastShare: ising.leastShare,
})

/** Never so little that a chain which needs nothing would fall apart. */
const held = (strength: number, { maxAbsJ, leastShare }: StrengthGround): number =>
  Math.max(strength, leastShare * maxAbsJ)

/** What a rule gives one chain; rules with one k for all say it themselves. */
export function strengthByRule({ rule, value, k }: RuleView, chain: ChainRow, ground: StrengthGround): number {
  if (rule === 'choi') return held(value! * Math.max(0, chain.pull - Math.abs(chain.field)), ground)
  if (rule === 'cut') return held(value! * chain.cutBound, ground)
  return k.max
}

/** The strength of a chain as it is drafted; NaN while nothing readable is typed. */
export function draftedStrength(chain: ChainRow, draft: StrengthDraft): number {
  if (draft.rule !== 'manual') return chain.strength
  return Object.hasOwn(draft.perChain, chain.label) ? draft.perChain[chain.label]! : (draft.value ?? Number.NaN)
}

/** Whether a chain has a strength of its own. */
export const hasOwnStrength = ({ label }: ChainRow, { rule, perChain }: StrengthDraft): boolean =>
  rule === 'manual' && Object.hasOwn(perChain, label)

/** The same strengths as a draft that names chains: those of a rule that gives every chain its own are all named. */
export function asManual(draft: StrengthDraft, chains: readonly ChainRow[]): StrengthDraft {
  if (draft.rule === 'manual') return draft
  const breakable = chains.filter(isBreakable)
  const value = breakable.reduce((most, { strength }) => Math.max(most, strength), 0)
  const others = breakable.filter(({ strength }) => strength !== value)
  const perChain = Object.fromEntries(others.map(({ label, strength }) => [label, strength]))
  return { rule: 'manual', value, perChain }
}

function editedStrength(edit: StrengthEdit, chain: ChainRow, draft: StrengthDraft, ground: StrengthGround) {
  switch (edit.to) {
    case 'value':
      return edit.k
    case 'multiple':
      return draftedStrength(chain, draft) * edit.factor
    case 'bound':
      return held(edit.margin * chain.cutBound, ground)
    case 'rule':
      return strengthByRule(edit.rule, chain, ground)
    case 'shared':
      return draft.value
  }
}

/**
 * The draft with the strengths of some chains changed. Chains of one qubit have no coupler and are left alone; one whose
 * strength is that of all chains is not named.
 */
export function editStrengths(
  before: StrengthDraft,
  chains: readonly ChainRow[],
  chosen: ReadonlySet<number>,
  edit: StrengthEdit,
  ground: StrengthGround,
): StrengthDraft {
  const draft = asManual(before, chains)
  const named = new Map(Object.entries(draft.perChain))
  for (const chain of chains) {
    if (!chosen.has(chain.variable) || !isBreakable(chain)) continue
    const strength = editedStrength(edit, chain, draft, ground)
    // Nothing readable is typed for all chains: there is nothing to multiply.
    if (Number.isNaN(strength)) continue
    if (strength === null || strength === draft.value) named.delete(chain.label)
    else named.set(chain.label, strength)
  }
  return { ...draft, perChain: Object.fromEntries(named) }
}
