import { STRENGTH_DEFAULTS } from '../../programming/strength'
import { wilson } from '../intervals'
import type { ChainEvidence, Evidence } from './evidence'
import type { AdviceItem } from './item'
import { breaksOf, namesOf, shareFigure, weightOf } from './item'

/** Fewer broken reads than this may be chance, whatever the others do. */
const LEAST_BREAKS = 5
/** Figures are given of the worst ones only. */
const MOST_SHOWN = 3

/** Chains under their bound that break more often than the others do together, intervals apart; worst first. */
export function weakChains({ chains, reads }: Evidence): ChainEvidence[] {
  const all = breaksOf(chains)
  const others = (chains.length - 1) * reads
  return chains
    .filter(
      ({ strength, bound, breaks }) =>
        strength < bound && breaks >= LEAST_BREAKS && wilson(breaks, reads).low > wilson(all - breaks, others).high,
    )
    .sort((a, b) => b.breaks - a.breaks || a.variable - b.variable)
}

/** Raise k of the chains that are held under their bound and break for it. */
export function raiseNamed(evidence: Evidence): AdviceItem[] {
  const { chains, reads } = evidence
  const weak = weakChains(evidence)
  if (weak.length === 0) return []
  const rest = chains.filter((chain) => !weak.includes(chain))
  const one = weak.length === 1
  return [
    {
      kind: 'raise-named',
      weight: weightOf('raise-named', breaksOf(weak) / breaksOf(chains)),
      action: {
        set: 'strength of chains',
        variables: weak.map(({ variable }) => variable),
        margin: STRENGTH_DEFAULTS.margin,
      },
      sentence: `Raise k of ${namesOf(weak.map(({ label }) => label))} to the cut bound and a little over it. ${one ? 'It is held' : 'They are held'} under ${one ? 'its' : 'their'} bound and ${one ? 'breaks' : 'break'} more often than the other chains.`,
      evidence: [
        ...weak
          .slice(0, MOST_SHOWN)
          .flatMap(({ label, breaks, strength, bound }) => [
            shareFigure(`reads in which ${label} broke`, breaks, reads),
            { name: `k of ${label} as a share of its bound`, value: strength / bound, unit: 'share' as const },
          ]),
        shareFigure('other chains, reads in which one broke', breaksOf(rest), rest.length * reads),
      ],
    },
  ]
}
