import type { EmbeddingView, UnmetView } from '#shared/schemas/embeddings'
import type { Fact } from '../ui/parts'
import type { ChainFindings } from './layers'
import { methodName } from './methods'
import { triesText } from './search'
import { CHAIN_READS } from '../returns/facts'
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
  const { lengthHistogram: histogram, qubitsUsed } = stats
  return [
    {
      label: 'Longest chain',
      value: formatNumber(stats.chainLength.max),
      unit: stats.chainLength.max === 1 ? 'qubit' : 'qubits',
      help: { id: 'longestChain', given: { histogram } },
      name: 'the length of the longest chain',
    },
    {
      label: 'Mean length',
      value: formatNumber(stats.chainLength.mean, { decimals: 2 }),
      help: { id: 'meanLength', given: { histogram } },
    },
    {
      label: 'Qubits used',
      value: formatNumber(qubitsUsed),
      note: `of ${formatNumber(machine.qubits)}, ${formatPercent(stats.unusedShare)} left free`,
      help: { id: 'qubitsUsed', given: { histogram, working: machine.qubits } },
      name: 'the number of qubits used',
    },
    {
      label: 'Chain couplers',
      value: formatNumber(stats.chainCouplers),
      help: {
        id: 'chainCouplers',
        given: { couplers: stats.chainCouplers, used: qubitsUsed, chains: problem.variables },
      },
      name: 'the number of chain couplers',
    },
    {
      label: 'Interaction couplers',
      value: formatNumber(stats.interactionCouplers),
      note: `for ${formatNumber(problem.interactions)}`,
      help: {
        id: 'interactionCouplers',
        given: { couplers: stats.interactionCouplers, interactions: problem.interactions },
      },
      name: 'the number of interaction couplers',
    },
    methodFact(embedding),
  ]
}

/** usesOf[u] qubits are wanted by u chains. */
export function usesOf(chains: Readonly<Record<string, readonly number[]>>): number[] {
  const uses = new Map<number, number>()
  for (const qubit of Object.values(chains).flat()) uses.set(qubit, (uses.get(qubit) ?? 0) + 1)
  const counts: number[] = [0]
  for (const use of uses.values()) {
    while (counts.length <= use) counts.push(0)
    counts[use]!++
  }
  return counts
}

const overlapHelp = ({ overlap, partialChains }: UnmetView): Pick<Fact, 'help' | 'name'> => ({
  help: { id: 'overlap', given: { overlap, uses: usesOf(partialChains) } },
  name: 'the overlap left',
})

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
  if (unmet?.overlap)
    facts.push({
      label: 'Overlap left',
      value: formatNumber(unmet.overlap),
      note: 'too many uses',
      ...overlapHelp(unmet),
    })
  else if (unmet?.unmetInteractions)
    facts.push({
      label: 'Left over',
      value: formatNumber(unmet.unmetInteractions),
      note: 'interactions without a coupler',
      help: { id: 'unmetInteractions', given: { unmet: unmet.unmetInteractions } },
      name: 'the number left over',
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
      help: {
        id: 'rate',
        given: {
          ...broken,
          ...CHAIN_READS,
          format: { significant: 2 },
          rehearsal: samples.source === 'rehearsal',
        },
      },
      name: 'the share of chains broken',
    },
  ]
}

/** The strip under the title of an embedding. */
export function embeddingFacts(embedding: EmbeddingView, findings: ChainFindings | null): Fact[] {
  if (embedding.status !== 'found') return searchFacts(embedding)
  return [...foundFacts(embedding), ...(findings ? breaksFact(findings) : [])]
}
