import type { Readable } from 'node:stream'
import { DomainError } from '../../shared/errors'
import type { WorkspaceView } from '../../shared/schemas/archives'
import type { Actor, App } from '../app'
import { findUser, findWorkspace } from '../database/repositories/people'
import { countWork, workBytes } from '../database/repositories/workspace-rows'
import { packSnapshot, takeSnapshot } from './archive/write-archive'

/** The workspace, with what an export of it would hold. */
export async function workspaceView(app: App, { workspaceId }: Actor): Promise<WorkspaceView> {
  const workspace = (await findWorkspace(app.db, workspaceId))!
  const { problems, machines, embeddings, runSheets, returns, budgetEntries, auditEntries } = await countWork(
    app.db,
    workspaceId,
  )
  return {
    id: workspace.id,
    name: workspace.name,
    createdAt: workspace.createdAt.toISOString(),
    deletesAt: workspace.deletesAt?.toISOString() ?? null,
    holds: { problems, machines, embeddings, runSheets, returns, records: budgetEntries + auditEntries },
    bytes: await workBytes(app.db, workspaceId),
  }
}

/** The workspace as it is at this moment, as one ZIP that is packed while it is read. @param folder kept until then */
export async function exportWorkspace(
  app: App,
  { workspaceId, userId }: Actor,
  folder: string,
): Promise<{ fileName: string; stream: Readable }> {
  const person = await findUser(app.db, userId)
  if (!person) throw new DomainError('unauthenticated', 'session.ended', 'This account no longer exists.')
  const snapshot = await takeSnapshot(app, { workspaceId, madeBy: person.name, folder })
  const { workspace, madeAt } = snapshot.manifest
  return { fileName: `${workspace.name} ${madeAt.slice(0, 10)}.zip`, stream: packSnapshot(app, snapshot) }
}
