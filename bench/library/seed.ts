import { createBlobStore } from '../../server/database/repositories/blobs'
import { openDatabase } from '../../server/database/client'
import { memberships } from '../../server/database/schema'
import type { App } from '../../server/app'
import { seedLibrary } from '../../tests/support/library'

/** Fills the workspace of the folder's only member. No server may run on it meanwhile. */
export async function fill(folder: string, problems: number): Promise<void> {
  const database = await openDatabase({ dataFolder: folder })
  const blobs = createBlobStore(database, () => new Date())
  const [member] = await database.db.select().from(memberships)
  const app = { database, db: database.db, blobs } as unknown as App
  await seedLibrary(app, { userId: member!.userId, workspaceId: member!.workspaceId }, { problems, seed: 1 })
  await database.close()
}
