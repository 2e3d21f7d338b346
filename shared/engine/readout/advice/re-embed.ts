import { wilson } from '../intervals'
import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { breaksOf, namesOf, shareFigure, weightOf } from './item'

/** Long: this many times the median chain, and over it by two qubits at least, for a shortening to be worth while. Ours. */
const LONG = { times: 1.5, over: 2 }
const LEAST_BREAKS = 5
const MOST_SHOWN = 3

/** Re-embed long chains that break although they are held at their bound or above it. */
export function reEmbed({ chains, reads }: Evidence): AdviceItem[] {
  if (chains.length < 2) return []
  const lengths = chains.map(({ length }) => length).toSorted((a, b) => a - b)
  const middle = lengths[lengths.length >> 1]!
  const isLong = (length: number): boolean => length >= LONG.times * middle && length >= middle + LONG.over
  const shorter = chains.filter(({ length }) => !isLong(length))
  const others = wilson(breaksOf(shorter), shorter.length * reads)
  const long = chains
    .filter(({ length, strength, bound, breaks }) => isLong(length) && strength >= bound && breaks >= LEAST_BREAKS)
    .filter(({ breaks }) => wilson(breaks, reads).low > others.high)
    .sort((a, b) => b.breaks - a.breaks || a.variable - b.variable)
  if (long.length === 0) return []
  return [
    {
      kind: 're-embed',
      weight: weightOf('re-embed', breaksOf(long) / breaksOf(chains)),
      action: { look: 'embedding', variables: long.map(({ variable }) => variable) },
      sentence: `Shorten the ${long.length === 1 ? 'chain' : 'chains'} of ${namesOf(long.map(({ label }) => label))}: long, held at the bound or above it, and breaking more often than shorter ones all the same.`,
      evidence: [
        ...long
          .slice(0, MOST_SHOWN)
          .flatMap(({ label, length, breaks }) => [
            shareFigure(`reads in which ${label} broke`, breaks, reads),
            { name: `qubits of ${label}`, value: length, unit: 'count' as const },
          ]),
        { name: 'qubits of the median chain', value: middle, unit: 'count' },
        shareFigure('shorter chains, reads in which one broke', breaksOf(shorter), shorter.length * reads),
      ],
    },
  ]
}
