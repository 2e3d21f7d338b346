import { histogram, weightsInBins } from '../../shared/engine/readout/energies'
import type { Decoding, DecodingRow, EnergySeries, ReturnView } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { returnToCompare } from '../database/repositories/run-sheets'
import type { DecodedRows } from '../workers/tasks/summarise'
import { loadReturn } from './loaded-return'
import type { Bench } from './programming'
import { decodedBy } from './return-summary'
import { readsIn } from './samples-data'
import { signed, signOf } from './sense'

const TITLES: Record<Decoding, string> = {
  majority: 'Majority',
  discard: 'Discard broken reads',
  descent: 'Energy-descent repair',
}
const ENERGY_BINS = 36

/** Energies, each with the reads that it stands for. */
export interface Weighted {
  energies: Float64Array
  counts: Uint32Array
}

export const weighted = ({ energies, states }: DecodedRows): Weighted => ({ energies, counts: states.counts })

/** Mean and median of energies weighted by reads; null without reads. */
function centre({ energies, counts }: Weighted): { mean: number; median: number; total: number } | null {
  const reads = readsIn({ counts })
  if (reads === 0) return null
  const order = Array.from(energies.keys()).sort((a, b) => energies[a]! - energies[b]!)
  let below = 0
  let median = energies[order[0]!]!
  for (const row of order) {
    median = energies[row]!
    below += counts[row]!
    if (2 * below >= reads) break
  }
  const total = energies.reduce((sum, energy, row) => sum + energy * counts[row]!, 0)
  return { mean: total / reads, median, total }
}

/** One way of decoding, summed up in the problem's own sense. */
export function decodingRow({ problem }: Bench, rows: DecodedRows): DecodingRow {
  const decoded = weighted(rows)
  const sign = signOf(problem.sense)
  const middle = centre(decoded)
  const best = decoded.energies.reduce((least, energy) => Math.min(least, energy), Infinity)
  const bestCount = decoded.counts.reduce((sum, count, row) => sum + (decoded.energies[row] === best ? count : 0), 0)
  return {
    decoding: rows.method,
    title: TITLES[rows.method],
    readsKept: readsIn(decoded),
    ties: rows.ties,
    best: middle ? signed(sign, best) : null,
    bestCount,
    median: middle ? signed(sign, middle.median) : null,
    mean: middle ? signed(sign, middle.mean) : null,
    total: middle ? signed(sign, middle.total) : null,
  }
}

/** Steps of a cumulative curve: more than a screen can show apart. */
const MOST_STEPS = 240

/**
 * Reads at each energy or a better one, best first, in the problem's own sense. Of more energies than can be shown apart,
 * the best, the worst and every so many between.
 */
export function cumulativeReads({ energies, counts }: Weighted, sign: 1 | -1): EnergySeries['cumulative'] {
  const order = Array.from(energies.keys()).sort((a, b) => energies[a]! - energies[b]!)
  const steps: EnergySeries['cumulative'] = []
  let reads = 0
  order.forEach((row, k) => {
    reads += counts[row]!
    if (energies[order[k + 1]!] !== energies[row]) steps.push({ energy: signed(sign, energies[row]!), reads })
  })
  if (steps.length <= MOST_STEPS) return steps
  return Array.from({ length: MOST_STEPS }, (_, k) => steps[Math.round((k * (steps.length - 1)) / (MOST_STEPS - 1))]!)
}

const nameOf = (row: ReturnRow): string =>
  row.source === 'rehearsal' ? `Rehearsal ${row.number}` : `Samples ${row.number}`

/** Energies of this return and of the one it is best compared with, on the same bins. */
export async function energiesView(
  app: App,
  actor: Actor,
  row: ReturnRow,
  bench: Bench,
  decoded: DecodedRows,
): Promise<ReturnView['energies']> {
  const shown = weighted(decoded)
  const middle = centre(shown)
  if (!middle) return null
  const sign = signOf(bench.problem.sense)
  const all: { row: ReturnRow; energies: Float64Array; counts: Uint32Array }[] = [{ row, ...shown }]
  const other = await returnToCompare(app.db, row)
  if (other) {
    const { summary } = await loadReturn(app, actor, other)
    all.push({ row: other, ...weighted(decodedBy(summary, decoded.method)) })
  }
  const values = Float64Array.from(
    all.flatMap(({ energies }) => Array.from(energies, (energy) => signed(sign, energy))),
  )
  // The first histogram fixes bins that hold every value; each series is then counted into them.
  const { start, step, counts } = histogram(values, new Uint32Array(values.length).fill(1), ENERGY_BINS)
  const series: EnergySeries[] = all.map((entry) => ({
    title: nameOf(entry.row),
    returnId: entry.row.id,
    reads: readsIn(entry),
    counts: weightsInBins(
      entry.energies.map((energy) => signed(sign, energy)),
      entry.counts,
      { start, step, bins: counts.length },
    ),
    cumulative: cumulativeReads(entry, sign),
  }))
  const { best, bestCount, mean, median } = decodingRow(bench, decoded)
  return { best: best!, bestCount, mean: mean!, median: median!, start, width: step, series }
}
