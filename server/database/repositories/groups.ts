import { and, eq } from 'drizzle-orm'
import type { ConstraintGroup } from '../../../shared/schemas/problems'
import type { Db } from '../client'
import { problems, problemVersions } from '../schema'

/** Stores the groups of a version; false when it is no longer the current one. */
export async function saveGroups(
  tx: Db,
  problemId: string,
  version: number,
  groups: ConstraintGroup[],
  changedAt: Date,
): Promise<boolean> {
  const current = await tx
    .update(problems)
    .set({ changedAt })
    .where(and(eq(problems.id, problemId), eq(problems.currentVersion, version)))
    .returning({ id: problems.id })
  if (current.length === 0) return false
  await tx
    .update(problemVersions)
    .set({ groups })
    .where(and(eq(problemVersions.problemId, problemId), eq(problemVersions.version, version)))
  return true
}
