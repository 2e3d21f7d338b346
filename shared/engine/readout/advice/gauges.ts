import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { weightOf } from './item'

/** Of the tests together; one false alarm in a hundred returns. */
const LEVEL = 0.01
/** Under so many reads a second gauge costs more programming than it tells. Ours. */
const LEAST_READS = 100
/** Asked for where there was one, and reads that each must keep. Ours. */
const USUAL = 10
const READS_EACH = 10
const MOST = 1000

/** More gauges, where they differ more than chance lets them, or where all reads rest on one. */
export function moreGauges({
  asked: { gauges: asked, reads: askedReads },
  gaugeTests,
  precision,
  reads,
}: Evidence): AdviceItem[] {
  const room = Math.min(MOST, Math.floor(askedReads / READS_EACH))
  const found = gaugeTests.filter(({ adjusted }) => adjusted < LEVEL)
  const figures = found.map(({ of, adjusted }) => ({
    name: `chance of such differences in ${of} between equal gauges`,
    value: adjusted,
    unit: 'chance' as const,
  }))
  const to = Math.min(room, found.length > 0 ? Math.max(USUAL, 2 * asked) : USUAL)
  if (to <= asked) return []
  if (found.length > 0)
    return [
      {
        kind: 'more-gauges',
        weight: weightOf('more-gauges', 1),
        action: { set: 'gauges', to },
        sentence: `Read under ${to} gauges in place of ${asked}. Those there are differ in ${found.map(({ of }) => of).join(' and ')} more than chance lets them, so a few of them weigh too much.`,
        evidence: [{ name: 'gauges', value: asked, unit: 'count' }, ...figures],
      },
    ]
  if (asked > 1 || reads < LEAST_READS || !precision.isKnown) return []
  return [
    {
      kind: 'more-gauges',
      weight: weightOf('more-gauges', 0.5),
      action: { set: 'gauges', to },
      sentence: `Read under ${to} gauges. All reads come from one, so errors of the machine that keep their sign weigh fully on every read.`,
      evidence: [
        { name: 'gauges', value: asked, unit: 'count' },
        { name: 'reads', value: reads, unit: 'count' },
      ],
    },
  ]
}
