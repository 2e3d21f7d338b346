import type { SQL } from 'drizzle-orm'
import { and, arrayContains, eq, notInArray, or, sql } from 'drizzle-orm'
import { RECORDED } from '../../../../shared/audit'
import type { Db } from '../../client'
import { auditEntries, embeddings, problems, returns, runSheets } from '../../schema'
import type { ActivityScope } from './told'
import { told } from './told'

const hour = sql`date_trunc('hour', ${auditEntries.at})`
/** What it was called, without its name. */
const auditLabel = sql`split_part(${auditEntries.thing}, ' ', 1)`
/** Without in whose place it was decided. */
const deed = sql`${auditEntries.kind} || ' ' || split_part(${auditEntries.what}, ' (for ', 1)`

const missingIn = (table: typeof problems | typeof embeddings | typeof runSheets | typeof returns): SQL =>
  sql`not exists (select 1 from ${table} where ${table.id} = ${auditEntries.thingId} and ${table.deletedWith} is null)`
const isMissing = and(...[problems, embeddings, runSheets, returns].map(missingIn))

/** What no record of its own tells. A draft is saved as it is typed, so that the same within an hour is told once. */
export function otherDeeds(db: Db, scope: ActivityScope) {
  const id = 'problemId' in scope ? scope.problemId : scope.runSheetId
  return db
    .select(
      told({
        id: sql`max(${auditEntries.id})`,
        source: 'deed',
        kind: auditEntries.kind,
        by: auditEntries.by,
        token: auditEntries.token,
        at: sql`max(${auditEntries.at})`,
        thingId: auditEntries.thingId,
        label: auditLabel,
        isGone: isMissing,
        facts: sql`jsonb_build_object('what', ${auditEntries.what})`,
      }),
    )
    .from(auditEntries)
    .where(
      and(
        eq(auditEntries.workspaceId, scope.workspaceId),
        or(eq(auditEntries.thingId, id), arrayContains(auditEntries.within, [id])),
        notInArray(deed, [...RECORDED]),
      ),
    )
    .groupBy(
      auditEntries.by,
      auditEntries.token,
      auditEntries.what,
      auditEntries.kind,
      auditEntries.thingId,
      auditLabel,
      hour,
    )
}
