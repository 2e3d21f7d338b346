import type { FoundEmbedding } from './compare'
import type { HelpCase } from '../help/registry'

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
