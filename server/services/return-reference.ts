import type { ReferenceOfSamples } from '../../shared/schemas/reference'
import type { App } from '../app'
import { knownOptimum } from './known-optimum'
import type { Bench } from './programming'
import type { Weighted } from './return-energies'
import { proportion } from './proportion'
import { signed, signOf } from './sense'

/**
 * Decoded reads against the best known value of the version that was programmed; null where nobody has looked for it.
 * Energies that differ by rounding only count as equal.
 */
export async function referenceOfSamples(
  app: App,
  bench: Pick<Bench, 'problem' | 'ising'>,
  { energies, counts }: Weighted,
): Promise<ReferenceOfSamples | null> {
  const known = await knownOptimum(app, bench)
  if (!known) return null
  const { energy: reference, proved, method, tolerance } = known
  const total = counts.reduce((sum, count) => sum + count, 0)
  const hits = counts.reduce((sum, count, k) => sum + (energies[k]! <= reference + tolerance ? count : 0), 0)
  const best = energies.reduce((least, energy) => Math.min(least, energy), Infinity)
  const gap = Math.abs(best - reference) <= tolerance ? 0 : best - reference
  return {
    energy: signed(signOf(bench.problem.sense), reference),
    proved,
    method,
    gap: total > 0 ? gap : null,
    success: proportion(hits, total),
  }
}
