import { enumerationTolerance } from '../../shared/engine/problem/optimum/enumerate-slice'
import type { App } from '../app'
import { bestReference } from '../database/repositories/reference-optima'
import type { Bench } from './programming'

/** The best value that is known of the version that was programmed, of the problem as minimised. */
export interface KnownOptimum {
  energy: number
  proved: boolean
  method: string
  /** Energies closer than this differ by rounding only. */
  tolerance: number
}

/** Null where nobody has looked for it. */
export async function knownOptimum(
  app: App,
  { problem, ising }: Pick<Bench, 'problem' | 'ising'>,
): Promise<KnownOptimum | null> {
  const row = await bestReference(app.db, problem.id, problem.version)
  if (!row) return null
  const tolerance = enumerationTolerance(ising) + Number(row.detail.tolerance ?? 0)
  return { energy: row.energy!, proved: row.proved, method: row.method ?? '', tolerance }
}
