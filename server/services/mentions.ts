import { DomainError } from '../../shared/errors'
import { mentionedIn } from '../../shared/mentions'
import type { Person } from '../../shared/schemas/common'
import type { Actor } from '../app'
import type { Db } from '../database/client'
import { membersAmong } from '../database/repositories/people'

const MOST_MENTIONED = 20

/** Who is mentioned in a remark. @throws DomainError not acceptable, where somebody is no member of the workspace */
export async function mentionedMembers(tx: Db, { workspaceId }: Actor, remark: string): Promise<Person[]> {
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
