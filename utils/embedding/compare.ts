import type { EmbeddingOfProblem } from '#shared/schemas/problems'
import { isSearched, methodName } from './methods'
import { formatNumber, formatPercent } from '../format'
import { formatDuration } from '../formatTime'

/** An embedding that was found, with its figures at hand. */
export type FoundEmbedding = EmbeddingOfProblem & { stats: NonNullable<EmbeddingOfProblem['stats']> }

export type CompareField = 'longest' | 'mean' | 'total' | 'unused' | 'seconds'

interface CompareColumn {
  readonly field: CompareField
  readonly label: string
  /** Which end is the better one. */
  readonly better: 'less' | 'more'
  readonly of: (row: FoundEmbedding) => number | null
  readonly text: (row: FoundEmbedding) => string
}

/** The columns in which one embedding can be better than another. */
export const COMPARE_COLUMNS: readonly CompareColumn[] = [
  {
    field: 'longest',
    label: 'Longest chain',
    better: 'less',
    of: ({ stats }) => stats.chainLength.max,
    text: ({ stats }) => formatNumber(stats.chainLength.max),
  },
  {
    field: 'mean',
    label: 'Mean length',
    better: 'less',
    of: ({ stats }) => stats.chainLength.mean,
    text: ({ stats }) => formatNumber(stats.chainLength.mean, { decimals: 2 }),
  },
  {
    field: 'total',
    label: 'Qubits',
    better: 'less',
    of: ({ stats }) => stats.qubitsUsed,
    text: ({ stats }) => formatNumber(stats.qubitsUsed),
  },
  {
    field: 'unused',
    label: 'Left free',
    better: 'more',
    of: ({ stats }) => stats.unusedShare,
    text: ({ stats }) => formatPercent(stats.unusedShare, { decimals: 1 }),
  },
  {
    field: 'seconds',
    label: 'Time',
    better: 'less',
    of: ({ method, seconds }) => (isSearched(method) ? seconds : null),
    text: ({ method, seconds }) => formatDuration(isSearched(method) ? seconds : null),
  },
]

export const isFound = (row: EmbeddingOfProblem): row is FoundEmbedding => row.status === 'found' && row.stats !== null

/** The embeddings of the problem on one machine: those found, and those that ended otherwise. */
export function onMachine(embeddings: readonly EmbeddingOfProblem[], machineId: string) {
  const here = embeddings.filter((row) => row.machineId === machineId)
  return { found: here.filter(isFound), others: here.filter((row) => !isFound(row)) }
}

/**
 * The best value of each column, as it reads: values that read alike are equally good. Nothing where all are alike or
 * there is nothing to compare with.
 */
export function bestValues(rows: readonly FoundEmbedding[]): Map<CompareField, string> {
  const best = new Map<CompareField, string>()
  for (const { field, better, of, text } of COMPARE_COLUMNS) {
    const given = rows.filter((row) => of(row) !== null)
    if (new Set(given.map(text)).size < 2) continue
    const sign = better === 'less' ? 1 : -1
    best.set(field, text(given.reduce((a, b) => (sign * of(b)! < sign * of(a)! ? b : a))))
  }
  return best
}

/** What each heading sorts by; rows without a value come last in rising order. */
export const COMPARE_KEYS: Readonly<Record<string, (row: FoundEmbedding) => string | number>> = {
  number: ({ number }) => number,
  seed: ({ seed }) => seed,
  method: methodName,
  calibration: ({ calibration }) => calibration,
  ...Object.fromEntries(
    COMPARE_COLUMNS.map(({ field, of }) => [field, (row: FoundEmbedding) => of(row) ?? Number.POSITIVE_INFINITY]),
  ),
}
