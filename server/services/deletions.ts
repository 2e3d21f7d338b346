import { DomainError } from '../../shared/errors'
import type { DeletableKind, DeletionView } from '../../shared/schemas/deletions'
import type { Actor, App } from '../app'
import {
  carrierHidden,
  deleteForGood,
  findHidden,
  hiddenBefore,
  hide,
  unhide,
} from '../database/repositories/deletions'
import { clearAway } from './jobs'

/** Longer than the page offers to undo, so that the last moment of the offer still counts. */
const RESTORABLE_MS = 60_000

const KINDS: readonly DeletableKind[] = ['problem', 'embedding', 'run sheet']
const LETTERS: Record<DeletableKind, string> = { problem: 'P', embedding: 'E', 'run sheet': 'RS' }
/** What a thing stands on. */
const CARRIERS: Record<DeletableKind, string> = {
  problem: 'nothing',
  embedding: 'a problem',
  'run sheet': 'an embedding',
}

/**
 * Takes a thing out of sight with everything that stands on it. Nothing is lost yet: jobs at work on it go on and keep
 * their results, so that it can be brought back whole until it is swept away.
 */
export async function deleteFor(app: App, kind: DeletableKind, id: string): Promise<DeletionView> {
  const at = app.now()
  const hidden = await app.db.transaction((tx) => hide(tx, kind, id, at))
  if (!hidden) throw new DomainError('not found', 'deletion.done', `This ${kind} was deleted already.`)
  return { ok: true, restorableUntil: new Date(at.getTime() + RESTORABLE_MS).toISOString() }
}

/** Brings back what was deleted a moment ago. */
export async function restore(app: App, actor: Actor, kind: DeletableKind, id: string): Promise<void> {
  const since = new Date(app.now().getTime() - RESTORABLE_MS)
  await app.db.transaction(async (tx) => {
    const row = await findHidden(tx, kind, actor.workspaceId, id, since)
    if (!row)
      throw new DomainError(
        'not found',
        'deletion.final',
        `There is no deletion of this ${kind} that can still be undone.`,
      )
    if (await carrierHidden(tx, kind, id))
      throw new DomainError(
        'wrong state',
        'deletion.carrier',
        `${LETTERS[kind]}-${row.number} stands on ${CARRIERS[kind]} that was deleted too. Bring that back first.`,
      )
    await unhide(tx, id)
  })
}

/** Deletes for good what can no longer be brought back, with its stored arrays and its jobs. */
export async function sweepDeletions(app: App): Promise<void> {
  const before = new Date(app.now().getTime() - RESTORABLE_MS)
  for (const kind of KINDS)
    for (const id of await hiddenBefore(app.db, kind, before))
      await app.db.transaction(async (tx) => {
        const deleted = await deleteForGood(tx, kind, id, before)
        if (deleted) await clearAway(app, tx, deleted)
      })
}
