import { DomainError } from '../../shared/errors'
import type { HeldState } from '../../shared/schemas/spins'
import type { Actor, App } from '../app'
import { bestReference } from '../database/repositories/reference-optima'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { returnsOfRunSheets } from '../database/repositories/run-sheets'
import type { Bench } from './programming'
import { solutionsOf } from './return-solutions'
import { signed, signOf } from './sense'

export interface KnownState {
  /** +1 or −1 for each variable. */
  spins: Int8Array
  held: HeldState
}

/** The samples of a run sheet with the lowest energy of the problem as stored, to be minimised. */
function bestOf(rows: readonly ReturnRow[], sign: 1 | -1): { row: ReturnRow; energy: number } | null {
  let best: { row: ReturnRow; energy: number } | null = null
  for (const row of rows) {
    if (row.status !== 'ready' || row.best === null) continue
    const energy = signed(sign, row.best)
    if (!best || energy < best.energy) best = { row, energy }
  }
  return best
}

/**
 * The best state that is known of a run sheet's problem: a proved reference optimum, else the better of the best one
 * found and the best majority-decoded sample of the run sheet.
 * @throws DomainError wrong state where there is none of them
 */
export async function bestKnownState(app: App, actor: Actor, runSheetId: string, bench: Bench): Promise<KnownState> {
  const { problem, labels } = bench
  const sign = signOf(problem.sense)
  const reference = await bestReference(app.db, problem.id, problem.version)
  const sampled = bestOf(await returnsOfRunSheets(app.db, [runSheetId]), sign)
  if (reference && (reference.proved || !sampled || reference.energy! <= sampled.energy)) {
    const bytes = await app.blobs.read(reference.stateBlobId!)
    const from = `the reference optimum, ${reference.proved ? 'proved' : 'the best found'}`
    const spins = Int8Array.from(bytes, (value) => (value === 1 ? 1 : -1))
    return { spins, held: { from, energy: signed(sign, reference.energy!) } }
  }
  if (!sampled)
    throw new DomainError(
      'wrong state',
      'spins.no-state',
      'No state of this problem is known yet. Rehearse the run sheet, or look for a reference optimum of the problem.',
    )
  const asked = { decode: 'majority', limit: 1, feasibleOnly: false } as const
  const [solution] = await solutionsOf(app, actor, sampled.row.id, asked)
  const spins = Int8Array.from(labels, (label) => (solution!.assignment[label] === 1 ? 1 : -1))
  const source = sampled.row.source === 'rehearsal' ? 'rehearsal' : 'return'
  return { spins, held: { from: `the best sample of ${source} ${sampled.row.number}`, energy: solution!.energy } }
}
