import type { ReturnView } from '#shared/schemas/returns'
import type { Fact } from '../ui/parts'
import { formatCount, formatNumber, formatPercent, formatPercentInterval } from '../format'
import { formatDuration } from '../formatTime'

const PERCENT = { significant: 3 }
/** What rates of breaks count, and of what. */
export const READS_WITH_BREAK = { counted: 'reads with a broken chain', of: 'reads' }
export const CHAIN_READS = {
  counted: 'broken chains over all reads',
  of: 'reads times chains of two or more qubits',
}
const DECODED: Record<ReturnView['decode'], string> = {
  majority: ' by majority',
  discard: ' without a break',
  descent: ' after repair',
}

/** The strip under the title of a set of samples. */
export function returnFacts(samples: ReturnView): Fact[] {
  const { breaks, energies, made, reads, source, seconds, best } = samples
  const rehearsal = source === 'rehearsal'
  const shown = samples.decodings.find(({ decoding }) => decoding === samples.decode)
  const facts: Fact[] = [
    {
      label: samples.problem.sense === 'min' ? 'Best energy' : 'Best value',
      value: formatNumber(energies?.best),
      note: energies ? `in ${formatCount(energies.bestCount, 'read')}${DECODED[samples.decode]}` : undefined,
      help: best ? { id: 'energyOfState', given: { ...best.parts, rehearsal } } : undefined,
    },
    { label: 'Reads', value: formatNumber(reads) },
  ]
  if (breaks)
    facts.push(
      {
        label: 'Reads with a break',
        value: formatPercent(breaks.readsWithBreak.rate, PERCENT),
        note: formatPercentInterval(breaks.readsWithBreak.low, breaks.readsWithBreak.high, PERCENT),
        help: {
          id: 'rate',
          given: { ...breaks.readsWithBreak, ...READS_WITH_BREAK, format: PERCENT, rehearsal },
        },
        name: 'the share of reads with a break',
      },
      {
        label: 'Chain reads broken',
        value: formatPercent(breaks.chainReads.rate, PERCENT),
        help: { id: 'rate', given: { ...breaks.chainReads, ...CHAIN_READS, format: PERCENT, rehearsal } },
        name: 'the share of chain reads broken',
      },
    )
  if (shown && samples.decode !== 'discard')
    facts.push({
      label: 'Ties',
      value: formatNumber(shown.ties),
      help: { id: 'ties', given: { ties: shown.ties } },
      name: 'the number of ties',
    })
  if (rehearsal)
    facts.push({
      label: 'Made by',
      value: 'rehearsal',
      word: true,
      note: seconds === null ? '' : `${formatDuration(seconds)} of computing`,
    })
  else
    facts.push({
      label: 'Made by',
      value: made.byBridge ? 'bridge' : 'upload',
      word: true,
      note:
        typeof made.machineTimeSeconds === 'number' ? `${formatDuration(made.machineTimeSeconds)} on the machine` : '',
    })
  return facts
}
