import { sql } from 'drizzle-orm'
import { unionAll } from 'drizzle-orm/pg-core'
import type { Db } from '../../client'
import { otherDeeds } from './deeds'
import { problemRecords } from './problem-records'
import { runSheetRecords } from './run-sheet-records'
import type { ActivityRow, ActivityScope } from './told'

/** What happened, newest first. */
export async function listActivity(
  db: Db,
  scope: ActivityScope,
  page: { limit: number; offset: number },
): Promise<ActivityRow[]> {
  const deeds = otherDeeds(db, scope)
  const ofProblem = 'problemId' in scope ? problemRecords(db, scope.problemId) : []
  // All have one shape; their types differ by the tables that they join.
  const [first, ...others] = [...runSheetRecords(db, scope), ...ofProblem] as unknown as (typeof deeds)[]
  const rows = await unionAll(deeds, first!, ...others)
    .orderBy(sql`at desc, id desc`)
    .limit(page.limit)
    .offset(page.offset)
  return rows as ActivityRow[]
}
