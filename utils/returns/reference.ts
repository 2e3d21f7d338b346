import type { ReferenceOfSamples } from '#shared/schemas/reference'
import type { ReturnView } from '#shared/schemas/returns'
import type { Fact, MarkKind } from '../ui/parts'
import { formatNumber, formatPercent, formatPercentInterval } from '../format'

const PERCENT = { significant: 3 }

type Samples = Pick<ReturnView, 'reference' | 'energies' | 'problem' | 'source'>

/** The strip that holds the samples against the reference optimum. */
export function referenceFacts({ reference, energies, problem: { sense }, source }: Samples): Fact[] {
  if (!reference) return []
  const { energy, proved, method, gap, success } = reference
  const facts: Fact[] = [
    {
      label: 'Reference optimum',
      value: formatNumber(energy),
      note: `${proved ? 'proved' : 'best found'}, ${method}`,
    },
  ]
  if (gap === null || !energies) return facts
  facts.push(
    {
      label: 'Best read is worse by',
      value: formatNumber(gap),
      help: { id: 'gapToReference', given: { best: energies.best, reference: energy, sense, proved } },
      name: 'the gap to the reference optimum',
    },
    {
      label: 'Success probability',
      value: formatPercent(success.rate, PERCENT),
      note: formatPercentInterval(success.low, success.high, PERCENT),
      help: {
        id: 'successRate',
        given: {
          count: success.count,
          total: success.total,
          reference: energy,
          proved,
          format: PERCENT,
          rehearsal: source === 'rehearsal',
        },
      },
    },
  )
  return facts
}

interface Verdict {
  mark: MarkKind | null
  head: string
  text: string
}

function verdictOf({ proved, gap }: ReferenceOfSamples): Verdict {
  if (gap === null) return { mark: null, head: '', text: 'No read is left with this decoding.' }
  if (gap < 0 && !proved)
    return {
      mark: 'computed',
      head: 'The samples beat the reference.',
      text: `The best read is better by ${formatNumber(-gap)} than the best found so far. Look for the optimum again: the reference is out of date.`,
    }
  if (gap <= 0)
    return proved
      ? {
          mark: 'passed',
          head: 'The proved optimum was reached.',
          text: 'No better assignment of this problem exists.',
        }
      : {
          mark: 'caution',
          head: 'As good as the best found.',
          text: 'That value is not proved: a better assignment may exist.',
        }
  return {
    mark: 'caution',
    head: 'The reference was not reached.',
    text: proved
      ? 'The optimum is proved, so the difference is what these samples miss.'
      : 'The reference itself is the best found, not a proof: the true difference may be larger.',
  }
}

/** What the comparison comes to, in words. */
export const referenceVerdict = ({ reference }: Pick<ReturnView, 'reference'>): Verdict =>
  reference
    ? verdictOf(reference)
    : {
        mark: null,
        head: '',
        text: 'Nobody has looked for the optimum of this version of the problem yet. Once it is known, the gap to it and the success probability are shown here.',
      }
