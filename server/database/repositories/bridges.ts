import { and, eq } from 'drizzle-orm'
import type { Db } from '../client'
import { bridges } from '../schema'

export type BridgeRow = typeof bridges.$inferSelect

/** The bridge of a machine of the workspace. */
export async function findBridge(db: Db, workspaceId: string, machineId: string): Promise<BridgeRow | undefined> {
  return (
    await db
      .select()
      .from(bridges)
      .where(and(eq(bridges.workspaceId, workspaceId), eq(bridges.machineId, machineId)))
  )[0]
}

export async function insertBridge(tx: Db, row: typeof bridges.$inferInsert): Promise<void> {
  await tx.insert(bridges).values(row)
}

export async function updateBridge(db: Db, id: string, set: Partial<typeof bridges.$inferInsert>): Promise<void> {
  await db.update(bridges).set(set).where(eq(bridges.id, id))
}

export async function deleteBridge(db: Db, id: string): Promise<void> {
  await db.delete(bridges).where(eq(bridges.id, id))
}
