import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import {
  findUser,
  findWorkspace,
  firstWorkspaceOf,
  listMembers,
  lockWorkspace,
  setWorkspaceDeletion,
  workspacesDue,
} from '../database/repositories/people'
import { deleteUnreferred, peopleOfWorkspace } from '../database/repositories/person-removal'
import { deleteWork, workBlobs } from '../database/repositories/workspace-rows'
import type { Letter } from '../mail/letter'
import { deletionAskedLetter, deletionTakenBackLetter } from '../mail/workspace-letters'
import { tell } from './mail'
import { removeAccount } from './person-removal'

/** From when it was asked for until a workspace is deleted for good. */
export const COOLING_DAYS = 14
const DAY_MS = 24 * 60 * 60 * 1000

async function tellMembers(app: App, tx: Db, { workspaceId, userId }: Actor, letter: Letter): Promise<void> {
  const members = await listMembers(tx, workspaceId)
  await tell(app, tx, { workspaceId, by: userId }, new Map(members.map(({ id }) => [id, letter])))
}

/**
 * Asks for the deletion of the workspace: it goes on for two weeks, during which any owner can take that back. All members
 * are told.
 * @returns when it is deleted
 */
export async function askDeletion(app: App, actor: Actor, name: string): Promise<Date> {
  return app.db.transaction(async (tx) => {
    await lockWorkspace(tx, actor.workspaceId)
    const workspace = (await findWorkspace(tx, actor.workspaceId))!
    if (name !== workspace.name)
      throw new DomainError(
        'not acceptable',
        'workspace.name',
        `This is not the name of the workspace: ${workspace.name}.`,
        [{ path: 'name', message: `write ${workspace.name}` }],
      )
    if (workspace.deletesAt) return workspace.deletesAt
    const deletesAt = new Date(app.now().getTime() + COOLING_DAYS * DAY_MS)
    await setWorkspaceDeletion(tx, actor.workspaceId, deletesAt)
    const by = (await findUser(tx, actor.userId))!.name
    await tellMembers(app, tx, actor, deletionAskedLetter(workspace.name, by, deletesAt))
    return deletesAt
  })
}

/** Keeps the workspace after all. */
export async function takeDeletionBack(app: App, actor: Actor): Promise<void> {
  await app.db.transaction(async (tx) => {
    await lockWorkspace(tx, actor.workspaceId)
    const workspace = (await findWorkspace(tx, actor.workspaceId))!
    if (!workspace.deletesAt) return
    await setWorkspaceDeletion(tx, actor.workspaceId, null)
    const by = (await findUser(tx, actor.userId))!.name
    await tellMembers(app, tx, actor, deletionTakenBackLetter(workspace.name, by))
  })
}

/** Removes a workspace with everything in it, and the accounts that belong nowhere else. */
export async function deleteWorkspaceForGood(app: App, tx: Db, workspaceId: string): Promise<void> {
  const { members, archived } = await peopleOfWorkspace(tx, workspaceId)
  const blobIds = await workBlobs(tx, workspaceId)
  await deleteWork(tx, workspaceId)
  await app.blobs.remove(tx, blobIds)
  for (const userId of archived) await deleteUnreferred(tx, userId)
  for (const userId of members) {
    if (await firstWorkspaceOf(tx, userId)) continue
    await removeAccount(tx, userId)
    await deleteUnreferred(tx, userId)
  }
}

/** Deletes the workspaces whose time has come. */
export async function sweepWorkspaces(app: App): Promise<void> {
  for (const id of await workspacesDue(app.db, app.now()))
    await app.db.transaction(async (tx) => {
      await lockWorkspace(tx, id)
      const workspace = await findWorkspace(tx, id)
      if (workspace?.deletesAt && workspace.deletesAt <= app.now()) await deleteWorkspaceForGood(app, tx, id)
    })
}
