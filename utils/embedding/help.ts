import type { ProgrammedView } from '#shared/schemas/run-sheets'
import type { FoundEmbedding } from './compare'
import type { EmbeddingChains } from './layers'
import type { HelpCase } from '../help/registry'
import type { LatticeData } from '../lattice/types'
import { formatNumber, THIN_SPACE } from '../format'

/** How the columns in which embeddings are compared are computed, embedding by embedding. */
export function compareCases(rows: readonly FoundEmbedding[], chains: number) {
  const label = ({ number }: FoundEmbedding) => `E-${number}`
  return {
    mean: rows.map((row): HelpCase => ({
      label: label(row),
      help: { id: 'meanOfTotals', given: { used: row.stats.qubitsUsed, chains } },
    })),
    free: rows.map((row): HelpCase => {
      const { qubitsUsed: used, unusedShare } = row.stats
      // Of the calibration it was made at, which the row names but does not describe.
      const working = Math.round(used / (1 - unusedShare))
      return { label: label(row), help: { id: 'unusedShare', given: { used, working, format: { decimals: 1 } } } }
    }),
  }
}

/** The fullest coupling sum of every chain, as a share of the machine's range on its side. */
export function sumCases(
  lattice: Pick<LatticeData, 'ids'>,
  { labels, offsets, qubits, ranges }: EmbeddingChains,
  programmed: ProgrammedView,
): HelpCase[] {
  const bounds = ranges.couplingSum
  if (!bounds) return []
  const sums = new Map<number, number>()
  for (const [a, b, J] of programmed.J) for (const id of [a, b]) sums.set(id, (sums.get(id) ?? 0) + J)
  const show = (share: number) => `${formatNumber(100 * share, { decimals: 0 })}${THIN_SPACE}%`
  return labels.map((label, i) => {
    const own = [...qubits.subarray(offsets[i], offsets[i + 1])].map((q) => sums.get(lattice.ids[q]!) ?? 0)
    const fullest = own.reduce((most, sum) => (share(sum, bounds) > share(most, bounds) ? sum : most), 0)
    const limit = bounds[fullest < 0 ? 0 : 1]
    return { label, help: { id: 'load', given: { what: 'coupling sum of a qubit', value: fullest, limit, show } } }
  })
}

const share = (sum: number, [low, high]: readonly [number, number]): number => (sum < 0 ? sum / low : sum / high)
