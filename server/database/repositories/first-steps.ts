import type { SQL } from 'drizzle-orm'
import { and, desc, eq, gt, isNull } from 'drizzle-orm'
import type { FirstStepsDone } from '../../../shared/schemas/first-steps'
import type { Db } from '../client'
import { embeddings, problems, returns, runSheetRemarks, runSheets } from '../schema'

interface Whose {
  userId: string
  workspaceId: string
  /** What was there before then was not made by the person. */
  since: Date
}

type Made = typeof problems | typeof embeddings | typeof returns

const own = (table: Made, { userId, workspaceId, since }: Whose): SQL | undefined =>
  and(
    eq(table.workspaceId, workspaceId),
    eq(table.createdBy, userId),
    gt(table.createdAt, since),
    isNull(table.deletedWith),
  )

const ownSheet = ({ userId, workspaceId, since }: Whose): SQL | undefined =>
  and(
    eq(runSheets.workspaceId, workspaceId),
    eq(runSheets.preparedBy, userId),
    gt(runSheets.createdAt, since),
    isNull(runSheets.deletedWith),
  )

const first = async <T>(rows: Promise<T[]>): Promise<T | null> => (await rows)[0] ?? null

const newestProblem = (db: Db, whose: Whose) =>
  first(
    db
      .select({ id: problems.id, number: problems.number, name: problems.name })
      .from(problems)
      .where(own(problems, whose))
      .orderBy(desc(problems.createdAt))
      .limit(1),
  )

const newestEmbedding = (db: Db, whose: Whose) =>
  first(
    db
      .select({ id: embeddings.id, number: embeddings.number, problem: problems.name })
      .from(embeddings)
      .innerJoin(problems, eq(problems.id, embeddings.problemId))
      .where(and(own(embeddings, whose), eq(embeddings.status, 'found')))
      .orderBy(desc(embeddings.createdAt))
      .limit(1),
  )

const newestSheet = (db: Db, whose: Whose) =>
  first(
    db
      .select({ id: runSheets.id, number: runSheets.number })
      .from(runSheets)
      .where(ownSheet(whose))
      .orderBy(desc(runSheets.createdAt))
      .limit(1),
  )

const newestRehearsal = (db: Db, whose: Whose) =>
  first(
    db
      .select({ id: returns.id, number: returns.number, runSheet: runSheets.number })
      .from(returns)
      .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
      .where(and(own(returns, whose), eq(returns.source, 'rehearsal'), eq(returns.status, 'ready')))
      .orderBy(desc(returns.createdAt))
      .limit(1),
  )

const newestSubmission = (db: Db, whose: Whose) =>
  first(
    db
      .select({ id: runSheets.id, number: runSheets.number })
      .from(runSheetRemarks)
      .innerJoin(runSheets, eq(runSheets.id, runSheetRemarks.runSheetId))
      .where(
        and(ownSheet(whose), eq(runSheetRemarks.by, whose.userId), eq(runSheetRemarks.what, 'submitted for review')),
      )
      .orderBy(desc(runSheetRemarks.createdAt))
      .limit(1),
  )

/** The newest of each step that a person made in a workspace. */
export async function newestOwnWork(db: Db, whose: Whose): Promise<FirstStepsDone> {
  return {
    problem: await newestProblem(db, whose),
    embedding: await newestEmbedding(db, whose),
    runSheet: await newestSheet(db, whose),
    rehearsal: await newestRehearsal(db, whose),
    submission: await newestSubmission(db, whose),
  }
}
