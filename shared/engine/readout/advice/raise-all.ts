import { wilson } from '../intervals'
import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { breaksOf, shareFigure, weightOf } from './item'
import { weakChains } from './raise-named'

/** With one chain in twenty broken, of a hundred chains in a read five rest on a vote. Ours. */
const MOST_BROKEN = 0.05
/** Least and greatest step. More than a doubling at once may crush the problem's own couplings: look in between. */
const STEP = { least: 1.25, greatest: 2 }

function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1]! + sorted[sorted.length >> 1]!) / 2
}

/** Raise k of all chains where many break, those that are advised on by name left aside. */
export function raiseAll(evidence: Evidence): AdviceItem[] {
  const { chains, reads } = evidence
  const weak = weakChains(evidence)
  const rest = chains.filter((chain) => !weak.includes(chain))
  const broken = breaksOf(rest)
  if (rest.length === 0 || wilson(broken, rest.length * reads).low <= MOST_BROKEN) return []
  const short = rest.filter(({ strength, bound }) => strength > 0 && strength < bound)
  const needed = short.length > 0 ? median(short.map(({ strength, bound }) => bound / strength)) : STEP.least
  const factor = Math.min(STEP.greatest, Math.max(STEP.least, needed))
  const named = weak.length > 0 ? ', those named above left aside' : ''
  return [
    {
      kind: 'raise-all',
      weight: weightOf('raise-all', broken / (rest.length * reads)),
      action: { set: 'strength of all', factor },
      sentence: `Raise k of all chains by ${Math.round(100 * (factor - 1))} %. Chains break in many reads${named}.`,
      evidence: [
        shareFigure(`chain reads that broke${named}`, broken, rest.length * reads),
        { name: `chains under their bound, of ${rest.length}`, value: short.length, unit: 'count' },
      ],
    },
  ]
}
