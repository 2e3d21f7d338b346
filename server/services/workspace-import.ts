import { randomUUID } from 'node:crypto'
import type { ArchivedMemberView } from '../../shared/schemas/archives'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { findArchivedPerson, listArchivedMembers, settleArchivedPerson } from '../database/repositories/archived-people'
import { insertJob } from '../database/repositories/jobs'
import { readPage } from '../database/repositories/pages'
import { replacePerson } from '../database/repositories/workspace-rows'
import { Archive } from './archive/open-archive'
import { countAttempt } from './attempts'
import type { StoredFile } from './stored-files'

const PER_PERSON = { most: 10, withinMinutes: 60 }

/**
 * Keeps an archive and queues its import as a new workspace. What is no archive is refused at once.
 * @returns id of the job
 */
export async function startImport(app: App, { workspaceId, userId }: Actor, file: StoredFile): Promise<string> {
  await countAttempt(app, `imports of ${userId}`, PER_PERSON)
  const archive = await Archive.open(file.path)
  archive.close()
  const subjectId = await app.blobs.writeFile(file.path)
  const id = randomUUID()
  await app.db.transaction(async (tx) => {
    await app.blobs.adopt(tx, subjectId)
    await insertJob(tx, { id, workspaceId, kind: 'import', subjectId, createdBy: userId }, app.now())
  })
  await app.queue.announce(id)
  return id
}

/** Who was a member where the archive comes from and has not come yet. */
export function archivedMembers(app: App, { workspaceId }: Actor, query: PageQuery): Promise<Page<ArchivedMemberView>> {
  return readPage(
    query,
    (place) => listArchivedMembers(app.db, workspaceId, place),
    (row) => ({ ...row, email: row.email! }),
  )
}

/** Somebody joins whom the archive of the workspace knows by the address that was just shown to be theirs: what they did is theirs again. */
export async function joinArchivedPerson(
  tx: Db,
  { workspaceId, email, userId }: { workspaceId: string; email: string; userId: string },
): Promise<void> {
  const known = await findArchivedPerson(tx, workspaceId, email)
  if (!known) return
  await replacePerson(tx, known, userId)
  await settleArchivedPerson(tx, known)
}
