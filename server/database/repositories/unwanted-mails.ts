import { and, eq, inArray } from 'drizzle-orm'
import type { ChosenMailKind } from '../../../shared/schemas/mail'
import type { Db } from '../client'
import { unwantedMails } from '../schema'

/** What of these people want no messages about, in a workspace. */
export async function listUnwanted(
  db: Db,
  workspaceId: string,
  userIds: readonly string[],
): Promise<{ userId: string; kind: ChosenMailKind }[]> {
  if (userIds.length === 0) return []
  return db
    .select({ userId: unwantedMails.userId, kind: unwantedMails.kind })
    .from(unwantedMails)
    .where(and(eq(unwantedMails.workspaceId, workspaceId), inArray(unwantedMails.userId, [...userIds])))
}

/** Puts these kinds in the place of those that a person did not want before. */
export async function replaceUnwanted(
  tx: Db,
  workspaceId: string,
  userId: string,
  kinds: readonly ChosenMailKind[],
): Promise<void> {
  await tx
    .delete(unwantedMails)
    .where(and(eq(unwantedMails.workspaceId, workspaceId), eq(unwantedMails.userId, userId)))
  if (kinds.length > 0)
    await tx
      .insert(unwantedMails)
      .values(kinds.map((kind) => ({ workspaceId, userId, kind })))
      .onConflictDoNothing()
}
