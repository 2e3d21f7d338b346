import { randomUUID } from 'node:crypto'
import { withNames } from '../../shared/mentions'
import type { Actor, App } from '../app'
import { insertRemark } from '../database/repositories/run-sheets'
import { mentionedMembers } from './mentions'
import { tellRemark } from './run-sheet-letters'
import { runSheetRow } from './run-sheets'

/** Adds to the remarks of a run sheet, in any state, and tells preparer, reviewer and whom it mentions, unless they wrote it. */
export async function addRemark(app: App, actor: Actor, id: string, remark: string): Promise<{ at: string }> {
  const row = await runSheetRow(app, actor, id)
  const createdAt = app.now()
  await app.db.transaction(async (tx) => {
    const people = await mentionedMembers(tx, actor, remark)
    const mentions = people.map((person) => person.id)
    const said = {
      id: randomUUID(),
      runSheetId: id,
      by: actor.userId,
      what: 'remark',
      text: remark,
      mentions,
      createdAt,
    }
    await insertRemark(tx, said)
    await tellRemark(app, tx, row, { by: actor.userId, remark: withNames(remark, people), mentioned: mentions })
  })
  return { at: createdAt.toISOString() }
}
