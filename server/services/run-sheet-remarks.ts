import { randomUUID } from 'node:crypto'
import type { Actor, App } from '../app'
import { insertRemark } from '../database/repositories/run-sheets'
import { tellRemark } from './run-sheet-letters'
import { runSheetRow } from './run-sheets'

/** Adds to the remarks of a run sheet, in any state, and tells preparer and reviewer unless they wrote it. */
export async function addRemark(app: App, actor: Actor, id: string, remark: string): Promise<{ at: string }> {
  const row = await runSheetRow(app, actor, id)
  const createdAt = app.now()
  await app.db.transaction(async (tx) => {
    const said = { id: randomUUID(), runSheetId: id, by: actor.userId, what: 'remark', text: remark, createdAt }
    await insertRemark(tx, said)
    await tellRemark(app, tx, row, { by: actor.userId, remark })
  })
  return { at: createdAt.toISOString() }
}
