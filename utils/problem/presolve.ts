import type { Rule } from '#shared/engine/problem/presolve/record'
import type { PresolveState, PresolveSummary, PresolveView, RemovedVariable } from '#shared/schemas/presolve'
import type { Fact } from '../ui/parts'
import { formatCount, formatNumber } from '../format'

/** Words for what pre-solve did. */

export const RULE_NAMES: Record<Rule, string> = {
  isolated: 'no interaction left',
  sign: 'sign of its change',
  leaf: 'leaf',
  follow: 'follows one neighbour',
  fold: 'folded into two neighbours',
  'roof strong': 'roof duality, every optimum',
  'roof weak': 'roof duality, some optimum',
  component: 'component solved',
}

/** The rule's own sentence, once for all variables that it took out. */
export const RULE_SENTENCES: Record<Rule, string> = {
  isolated: 'Only its linear term a is left, and that decides it.',
  sign: 'Whatever its neighbours are, going up never helps (or never harms), so one value is best.',
  leaf: 'It has one neighbour, and the best value follows from that one.',
  follow: 'One interaction outweighs all else at it, so it equals that neighbour or opposes it.',
  fold: 'Its best value is a function of its two neighbours; its part of the energy becomes terms of theirs.',
  'roof strong': 'A maximum flow proves that it has this value in every optimum of what was left.',
  'roof weak': 'A maximum flow proves that all of these hold together in some optimum of what was left.',
  component: 'Its component was cut off and small, and every state of it was tried.',
}

type Form = PresolveView['problem']['form']

/** The two values of a variable as the form writes them. */
const valueNames = (form: Form): readonly [string, string] => (form === 'qubo' ? ['0', '1'] : ['−1', '+1'])

/** What a variable was set to: a value, or a rule by its partners. */
export function valueWords({ value, table, partners }: RemovedVariable, form: Form): string {
  const [down, up] = valueNames(form)
  if (value !== null) return value === 1 ? up : down
  if (partners.length === 1) return `${table[0] === 0 ? 'as' : 'opposite of'} ${partners[0]}`
  return `by ${partners.join(' and ')}`
}

const compare = (value: number, sign: '≥' | '≤'): string => `${formatNumber(value)} ${sign} 0`

/** Why a variable could be taken out: the quantities of its rule, in the QUBO form, to be minimised. */
export function reasonWords({ rule, table, partners, quantities }: RemovedVariable, form: Form): string {
  const [p = 0, q = 0, r = 0] = quantities
  const [down, up] = valueNames(form)
  const isUp = table[0] === 1
  switch (rule) {
    case 'isolated':
      return `a = ${compare(p, isUp ? '≤' : '≥')}`
    case 'sign':
      return isUp ? `a + Σ max(0, b) = ${compare(p, '≤')}` : `a + Σ min(0, b) = ${compare(p, '≥')}`
    case 'leaf':
    case 'follow': {
      const [atDown, atUp] = isUp ? (['≤', '≥'] as const) : (['≥', '≤'] as const)
      const word = (sign: '≥' | '≤'): string => (sign === '≥' ? 'at least' : 'at most')
      return `Going up changes E by ${word(atDown)} ${compare(p, atDown)} while ${partners[0]} is at ${down}, by ${word(atUp)} ${compare(q, atUp)} while it is at ${up}`
    }
    case 'fold':
      return `${up} exactly where a + b y + c z < 0: a = ${formatNumber(p)}, b = ${formatNumber(q)} with ${partners[0]}, c = ${formatNumber(r)} with ${partners[1]}`
    case 'roof strong':
    case 'roof weak':
      return `Round ${formatNumber(q)}, lower bound ${formatNumber(p)}`
    case 'component':
      return `${formatCount(p, 'variable')}, all states tried, least energy ${formatNumber(q)}`
  }
}

export interface RemovedFilter {
  text: string
  rule: Rule | ''
}

/** Variables whose label, or a partner's, holds the text, and that the rule took out. */
export function filterRemoved(removed: readonly RemovedVariable[], { text, rule }: RemovedFilter): RemovedVariable[] {
  const sought = text.trim().toLowerCase()
  const holds = (label: string): boolean => label.toLowerCase().includes(sought)
  return removed.filter((row) => (!rule || row.rule === rule) && (!sought || [row.label, ...row.partners].some(holds)))
}

/** "40 → 12" */
const change = (before: number, after: number): string => `${formatNumber(before)} → ${formatNumber(after)}`

/** The strip over a pre-solve. */
export function presolveFacts(summary: PresolveSummary, sense: 'min' | 'max'): Fact[] {
  const { before, after, bound, optimum, rounds } = summary
  const removed = before.variables - after.variables
  const best: Fact =
    optimum === null
      ? {
          label: sense === 'min' ? 'Lower bound' : 'Upper bound',
          value: formatNumber(bound),
          note: bound === null ? 'not reached' : 'proved',
          help: bound === null ? undefined : { id: 'presolveBound', given: { bound, rounds, sense, isSolved: false } },
        }
      : {
          label: 'Optimum',
          value: formatNumber(optimum),
          note: 'proved',
          help: { id: 'presolveBound', given: { bound: optimum, rounds, sense, isSolved: true } },
        }
  return [
    { label: 'Variables', value: change(before.variables, after.variables) },
    { label: 'Interactions', value: change(before.interactions, after.interactions) },
    { label: 'Taken out', value: formatNumber(removed), note: `of ${formatNumber(before.variables)}` },
    best,
  ]
}

/** The headline on the problem's page. */
export function presolveSentence({ before, after, optimum }: PresolveSummary): string {
  if (optimum !== null) return `Pre-solve settles every variable: the optimum is ${formatNumber(optimum)}, proved.`
  if (after.variables === before.variables) return 'Pre-solve takes no variable out of this problem.'
  const removed = before.variables - after.variables
  return `Pre-solve takes out ${formatNumber(removed)} of ${formatCount(before.variables, 'variable')}, without losing the optimum; ${formatCount(after.interactions, 'interaction')} of ${formatNumber(before.interactions)} are left.`
}

/** How far a pre-solve is. */
export function progressWords({ phase, left, round }: Extract<PresolveState, { state: 'running' }>): string {
  const phases = {
    neighbours: 'Rules for neighbours',
    'roof duality': `Roof duality, round ${round}`,
    components: 'Small components',
  }
  return `${phases[phase]}: ${formatCount(left, 'variable')} left`
}
