import { and, desc, eq, inArray, sql } from 'drizzle-orm'
import type { BudgetAccount } from '../../../shared/budget'
import { BUDGET_ACCOUNTS, BUDGET_MOVE_NAMES, BUDGET_MOVES } from '../../../shared/budget'
import type { Db } from '../client'
import { budgetEntries, embeddings, machines, problems, runSheets, users, workspaces } from '../schema'
import type { BudgetSubject } from '../schema/budget'

export type BudgetEntryRow = typeof budgetEntries.$inferSelect
export type { BudgetSubject } from '../schema/budget'

/** Nobody else adds to the ledger of this workspace before the transaction ends. */
export async function lockBudget(tx: Db, workspaceId: string): Promise<void> {
  await tx.select({ id: workspaces.id }).from(workspaces).where(eq(workspaces.id, workspaceId)).for('no key update')
}

export async function insertBudgetEntries(tx: Db, rows: readonly BudgetEntryRow[]): Promise<void> {
  if (rows.length > 0) await tx.insert(budgetEntries).values([...rows])
}

export async function hasBudgetEntries(db: Db, workspaceId: string): Promise<boolean> {
  const rows = await db
    .select({ id: budgetEntries.id })
    .from(budgetEntries)
    .where(eq(budgetEntries.workspaceId, workspaceId))
    .limit(1)
  return rows.length > 0
}

/** Microseconds that the entries moved on an account, less what they moved off it. */
function balanceOf(account: BudgetAccount) {
  const moves = (side: 'from' | 'to') => BUDGET_MOVE_NAMES.filter((move) => BUDGET_MOVES[move][side] === account)
  // Time that is granted came from outside: its account counts what went off it.
  const [plus, minus] = account === 'granted' ? [moves('from'), moves('to')] : [moves('to'), moves('from')]
  const amount = budgetEntries.microseconds
  return sql<string>`coalesce(sum(case when ${inArray(budgetEntries.move, plus)} then ${amount}
    when ${minus.length > 0 ? inArray(budgetEntries.move, minus) : sql`false`} then -${amount} else 0 end), 0)`
}

export interface PoolBalance extends Record<BudgetAccount, number> {
  machineId: string | null
  machineName: string | null
}

/** Microseconds on each account of each pool: of the workspace, or of what one run sheet moved. */
export async function budgetBalances(db: Db, workspaceId: string, runSheetId?: string): Promise<PoolBalance[]> {
  const balances = Object.fromEntries(BUDGET_ACCOUNTS.map((account) => [account, balanceOf(account)])) as Record<
    BudgetAccount,
    ReturnType<typeof balanceOf>
  >
  const rows = await db
    .select({
      machineId: budgetEntries.machineId,
      machineName: sql<string | null>`max(${budgetEntries.machineName})`,
      ...balances,
    })
    .from(budgetEntries)
    .where(
      and(
        eq(budgetEntries.workspaceId, workspaceId),
        runSheetId ? eq(budgetEntries.runSheetId, runSheetId) : undefined,
      ),
    )
    .groupBy(budgetEntries.machineId)
    .orderBy(sql`max(${budgetEntries.machineName}) nulls first`)
  return rows.map((row) => ({
    ...row,
    granted: Number(row.granted),
    available: Number(row.available),
    reserved: Number(row.reserved),
    spent: Number(row.spent),
  }))
}

/** Run sheets that time is held for, oldest hold first, with what is held (microseconds) and since when. */
export async function budgetHolds(db: Db, workspaceId?: string) {
  const held = balanceOf('reserved')
  return db
    .select({
      workspaceId: budgetEntries.workspaceId,
      runSheetId: sql<string>`${budgetEntries.runSheetId}`,
      microseconds: held.mapWith(Number),
      since: sql<Date>`max(${budgetEntries.at}) filter (where ${budgetEntries.move} = 'reserve')`.mapWith(
        budgetEntries.at,
      ),
      state: runSheets.state,
    })
    .from(budgetEntries)
    .leftJoin(runSheets, eq(runSheets.id, budgetEntries.runSheetId))
    .where(
      and(
        sql`${budgetEntries.runSheetId} is not null`,
        workspaceId ? eq(budgetEntries.workspaceId, workspaceId) : undefined,
      ),
    )
    .groupBy(budgetEntries.workspaceId, budgetEntries.runSheetId, runSheets.state)
    .having(sql`${held} > 0`)
    .orderBy(sql`max(${budgetEntries.at})`)
}

/** What the newest entry of each of these run sheets says that it is about. */
export async function budgetSubjects(db: Db, runSheetIds: readonly string[]): Promise<Map<string, BudgetSubject>> {
  if (runSheetIds.length === 0) return new Map()
  const rows = await db
    .selectDistinctOn([budgetEntries.runSheetId], { id: budgetEntries.runSheetId, about: budgetEntries.about })
    .from(budgetEntries)
    .where(inArray(budgetEntries.runSheetId, [...runSheetIds]))
    .orderBy(budgetEntries.runSheetId, desc(budgetEntries.number))
  return new Map(rows.flatMap(({ id, about }) => (id && about ? [[id, about]] : [])))
}

/** Microseconds spent by month (UTC), machine and problem, the newest month first. */
export async function budgetUse(db: Db, workspaceId: string) {
  const month = sql<string>`to_char(${budgetEntries.at} at time zone 'UTC', 'YYYY-MM')`
  const machine = sql<string>`${budgetEntries.about} -> 'machine' ->> 'id'`
  const problem = sql<string>`${budgetEntries.about} -> 'problem' ->> 'id'`
  return db
    .select({
      month,
      about: sql<BudgetSubject>`(array_agg(${budgetEntries.about} order by ${budgetEntries.number} desc))[1]`,
      microseconds: sql<string>`sum(${budgetEntries.microseconds})`.mapWith(Number),
    })
    .from(budgetEntries)
    .where(and(eq(budgetEntries.workspaceId, workspaceId), inArray(budgetEntries.move, ['settle', 'charge'])))
    .groupBy(sql`1`, machine, problem)
    .orderBy(sql`1 desc`)
}

/** Entries, newest first, each with what was available in its pool after it (microseconds). */
export async function listBudgetEntries(db: Db, workspaceId: string, page: { limit: number; offset: number }) {
  const available = (side: 'from' | 'to') =>
    inArray(
      budgetEntries.move,
      BUDGET_MOVE_NAMES.filter((move) => BUDGET_MOVES[move][side] === 'available'),
    )
  const amount = budgetEntries.microseconds
  return db
    .select({
      entry: budgetEntries,
      by: { id: users.id, name: users.name },
      available: sql<string>`sum(case when ${available('to')} then ${amount} when ${available('from')} then -${amount}
        else 0 end) over (partition by ${budgetEntries.machineId} order by ${budgetEntries.number})`.mapWith(Number),
    })
    .from(budgetEntries)
    .leftJoin(users, eq(users.id, budgetEntries.by))
    .where(eq(budgetEntries.workspaceId, workspaceId))
    .orderBy(desc(budgetEntries.number))
    .limit(page.limit)
    .offset(page.offset)
}

/** The machine and the problem of a run sheet, as they are named now. */
export async function budgetSubjectOf(db: Db, runSheetId: string): Promise<BudgetSubject> {
  const rows = await db
    .select({
      machine: { id: machines.id, name: machines.name },
      problem: { id: problems.id, number: problems.number, name: problems.name },
      runSheet: { id: runSheets.id, number: runSheets.number, name: runSheets.name },
    })
    .from(runSheets)
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .where(eq(runSheets.id, runSheetId))
  return rows[0]!
}
