import type { AnswerView } from '#shared/schemas/answers'
import { formatCount, formatNumber, formatPercent, formatPercentInterval } from '../format'
import { formatLongDate } from '../formatTime'
import type { Fact } from '../ui/parts'

const PERCENT = { significant: 3 }

const DECODED: Record<AnswerView['decode'], string> = {
  majority: 'each variable by the vote of its qubits',
  discard: 'from reads without a broken chain alone',
  descent: 'by the vote of its qubits, then improved by single changes',
}

/** The strip under the title. */
export function answerFacts({ problem, assignments, reads, readsKept, groups }: AnswerView): Fact[] {
  const [best] = assignments
  const facts: Fact[] = [
    {
      label: problem.sense === 'min' ? 'Lowest value found' : 'Highest value found',
      value: formatNumber(best?.energy),
      note: best ? `in ${formatCount(best.count, 'read')} of ${formatNumber(readsKept)}` : 'no read is left',
    },
    { label: 'Reads', value: formatNumber(reads) },
  ]
  if (groups.length > 0 && best)
    facts.push({
      label: 'Constraints kept',
      value: `${formatNumber(groups.length - best.broken.length)} of ${formatNumber(groups.length)}`,
      note: 'by the best assignment',
    })
  return facts
}

/** How sure it is, in sentences, each from one figure. */
export function certainty({ reference, assignments, readsKept, problem }: AnswerView): string[] {
  const [best] = assignments
  if (!best) return []
  const share = formatPercent(best.count / Math.max(1, readsKept), PERCENT)
  const seen =
    best.count === 1
      ? 'It was seen once: more reads would tell how often it comes.'
      : `It was seen ${formatNumber(best.count)} times, in ${share} of the reads.`
  if (!reference)
    return [
      seen,
      `Nobody has looked for the ${problem.sense === 'min' ? 'lowest' : 'highest'} value that is possible, so how far this one is from it is not known.`,
    ]
  const { success } = reference
  return [
    seen,
    `Reads reach ${reference.proved ? 'the optimum' : 'the best known value'} with a probability of ${formatPercent(success.rate, PERCENT)} (95 % interval ${formatPercentInterval(success.low, success.high, PERCENT)} %).`,
  ]
}

/** Where the answer comes from, row by row. */
export function provenance(answer: AnswerView): { label: string; value: string; note?: string }[] {
  const { source, runSheet, machine, embedding, problem, ofVersion, number, made, version, createdAt } = answer
  const breaks = answer.readsWithBreak
  return [
    {
      label: 'Problem',
      value: `P-${problem.number}, ${problem.name}`,
      note: `version ${ofVersion.version}: ${formatCount(problem.variables, 'variable')}, ${formatCount(problem.interactions, 'interaction')}`,
    },
    {
      label: source === 'rehearsal' ? 'Rehearsal' : 'Samples',
      value: `RS-${runSheet.number}/${number}`,
      note: `${runSheet.name}, ${formatLongDate(createdAt)}`,
    },
    source === 'rehearsal'
      ? { label: 'Made by', value: 'a classical stand-in', note: 'for checking settings, not the machine' }
      : {
          label: 'Machine',
          value: machine.name,
          note: `calibration ${machine.calibration}, embedding E-${embedding.number}`,
        },
    { label: 'Decoded', value: DECODED[answer.decode] },
    {
      label: 'Reads with a broken chain',
      value: formatPercent(breaks.rate, PERCENT),
      note: `95 % interval ${formatPercentInterval(breaks.low, breaks.high, PERCENT)} %`,
    },
    ...(runSheet.fingerprint
      ? [
          {
            label: 'SHA-256 of programmed values',
            value: runSheet.fingerprint,
            note: runSheet.reviewedBy ? `approved by ${runSheet.reviewedBy}` : undefined,
          },
        ]
      : [{ label: 'Approved', value: 'no', note: 'the run sheet was not approved, its settings may change' }]),
    ...(typeof made.sha256 === 'string' ? [{ label: 'SHA-256 of the samples’ file', value: made.sha256 }] : []),
    { label: 'Espalier', value: version },
  ]
}
