import { groupDigits } from '../../digits'
import { DEFAULT_CONFIDENCE, readsForConfidence, successProbability } from '../intervals'
import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { shareFigure, weightOf } from './item'

const MOST_READS = 100_000
/** Asked for in round numbers. */
const ROUND = 100

const rounded = (reads: number): number => Math.min(MOST_READS, ROUND * Math.ceil(reads / ROUND))

/** More reads, where those of the run sheet do not reach the wanted confidence at the low end of p's interval. */
export function moreReads({ success, asked: { reads: asked } }: Evidence): AdviceItem[] {
  if (!success || success.trials === 0) return []
  const { successes, trials, target } = success
  const { low, high } = successProbability(successes, trials)
  const isSeen = successes > 0
  const needed = readsForConfidence(isSeen ? low : high)
  const to = rounded(needed)
  if (to <= asked) return []
  const where = target === 'reference' ? 'the reference' : 'the best energy found'
  const wanted = `${DEFAULT_CONFIDENCE * 100} %`
  return [
    {
      kind: 'more-reads',
      weight: weightOf('more-reads', 1 - successes / trials),
      action: { set: 'reads', to },
      sentence: isSeen
        ? `Ask for ${groupDigits(to)} reads in place of ${groupDigits(asked)}. So many reach ${where} at least once with ${wanted} confidence, even at the low end of what its share may be.`
        : `Ask for ${groupDigits(to)} reads in place of ${groupDigits(asked)}, at least: no read reached ${where}, and with fewer it need not be seen even if its share is at the high end of what it may be.`,
      evidence: [
        shareFigure(`reads at ${where}`, successes, trials),
        { name: `reads for ${wanted} confidence`, value: Math.ceil(needed), unit: 'count' },
      ],
    },
  ]
}
