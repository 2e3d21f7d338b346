import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import { mentionedIn, withNames } from '../../shared/mentions'
import type { Person } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { membersAmong } from '../database/repositories/people'
import { insertRemark } from '../database/repositories/run-sheets'
import { tellRemark } from './run-sheet-letters'
import { runSheetRow } from './run-sheets'

const MOST_MENTIONED = 20

/** Who is mentioned in a remark. @throws DomainError not acceptable, where somebody is no member of the workspace */
async function mentionedMembers(tx: Db, { workspaceId }: Actor, remark: string): Promise<Person[]> {
  const ids = mentionedIn(remark)
  const refused = (message: string): DomainError =>
    new DomainError('not acceptable', 'remark.mentions', `The remark cannot be taken: ${message}.`, [
      { path: 'remark', message },
    ])
  if (ids.length > MOST_MENTIONED) throw refused(`it mentions more than ${MOST_MENTIONED} people`)
  const members = await membersAmong(tx, workspaceId, ids)
  const unknown = ids.find((id) => !members.some((member) => member.id === id))
  if (unknown !== undefined) throw refused(`it mentions @[${unknown}], and no member of this workspace has that id`)
  return members
}

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
