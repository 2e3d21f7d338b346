import type { EmbeddingView } from '#shared/schemas/embeddings'
import type { Fact } from '../ui/parts'
import type { ChainFindings } from './layers'
import { methodName } from './methods'
import { triesText } from './search'
import { formatCount, formatNumber, formatPercent } from '../format'
import { formatDuration, splitDuration } from '../formatTime'

const placeText = (tryNumber: number, of: number | null): string =>
  of === null ? formatNumber(tryNumber) : `${formatNumber(tryNumber)} of ${formatNumber(of)}`

function methodFact(embedding: EmbeddingView): Fact {
  const { method, tryNumber, triesPlanned, seed, seconds } = embedding
  if (method === 'imported') return { label: 'Method', value: 'imported', note: 'by hand or from a file' }
  if (method === 'edited')
    return {
      label: 'Method',
      value: methodName(embedding),
      word: true,
      note: embedding.start ? `from E-${embedding.start.number}` : undefined,
    }
  const place = triesPlanned !== 1 && tryNumber !== null ? `try ${placeText(tryNumber, triesPlanned)}, ` : ''
  return {
    label: 'Method',
    value: methodName(embedding),
    word: true,
    note: `${place}seed ${seed}, ${formatDuration(seconds)}`,
  }
}

function foundFacts(embedding: EmbeddingView): Fact[] {
  const { stats, machine, problem } = embedding
  if (!stats) return []
  return [
    { label: 'Longest chain', value: formatNumber(stats.chainLength.max), unit: 'qubits' },
    { label: 'Mean length', value: formatNumber(stats.chainLength.mean, { decimals: 2 }) },
    {
      label: 'Qubits used',
      value: formatNumber(stats.qubitsUsed),
      note: `of ${formatNumber(machine.qubits)}, ${formatPercent(stats.unusedShare)} left free`,
    },
    { label: 'Chain couplers', value: formatNumber(stats.chainCouplers) },
    {
      label: 'Interaction couplers',
      value: formatNumber(stats.interactionCouplers),
      note: `for ${formatNumber(problem.interactions)}`,
    },
    methodFact(embedding),
  ]
}

function searchFacts(embedding: EmbeddingView): Fact[] {
  const { problem, machine, triesPlanned, timeLimitSeconds, seed, seconds, unmet } = embedding
  const facts: Fact[] = [
    { label: 'Variables', value: formatNumber(problem.variables) },
    { label: 'Interactions', value: formatNumber(problem.interactions) },
    { label: 'Working qubits', value: formatNumber(machine.qubits), note: machine.family },
    {
      label: 'Method',
      value: methodName(embedding),
      word: true,
      note: `${triesPlanned === null ? triesText(embedding) : formatCount(triesPlanned, 'try', 'tries')}, seed ${seed}`,
    },
    { label: 'Time limit', value: formatNumber(timeLimitSeconds), unit: 's' },
  ]
  if (seconds !== null) facts.push({ label: 'Time taken', ...splitDuration(seconds) })
  if (unmet?.overlap) facts.push({ label: 'Overlap left', value: formatNumber(unmet.overlap), note: 'too many uses' })
  else if (unmet?.unmetInteractions)
    facts.push({
      label: 'Left over',
      value: formatNumber(unmet.unmetInteractions),
      note: 'interactions without a coupler',
    })
  return facts
}

function breaksFact({ samples }: ChainFindings): Fact[] {
  const broken = samples?.breaks?.chainReads
  if (!broken) return []
  return [
    {
      label: 'Chains broken',
      value: formatPercent(broken.rate, { significant: 2 }),
      note: `of ${formatNumber(broken.total)} chain reads`,
    },
  ]
}

/** The strip under the title of an embedding. */
export function embeddingFacts(embedding: EmbeddingView, findings: ChainFindings | null): Fact[] {
  if (embedding.status !== 'found') return searchFacts(embedding)
  return [...foundFacts(embedding), ...(findings ? breaksFact(findings) : [])]
}
