import type { BUDGET_ACCOUNTS } from '../../shared/budget'
import { BUDGET_MOVES, RESERVATION_DAYS } from '../../shared/budget'
import { csvWords } from '../../shared/csv'
import type { BudgetBalance, BudgetEntryView, BudgetView } from '../../shared/schemas/budget'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import type { PoolBalance } from '../database/repositories/budget'
import {
  budgetBalances,
  budgetHolds,
  budgetSubjects,
  budgetUse,
  listBudgetEntries,
} from '../database/repositories/budget'
import { listMachines } from '../database/repositories/machines'
import { pageOf, positionOf } from '../database/repositories/pages'

const DAY_MS = 86_400_000
const MOST_ROWS = 100_000
const MOST_MACHINES = 200

const inSeconds = (balance: Pick<PoolBalance, (typeof BUDGET_ACCOUNTS)[number]>): BudgetBalance => ({
  grantedSeconds: balance.granted / 1e6,
  availableSeconds: balance.available / 1e6,
  reservedSeconds: balance.reserved / 1e6,
  spentSeconds: balance.spent / 1e6,
})

const sumOf = (pools: readonly PoolBalance[], account: (typeof BUDGET_ACCOUNTS)[number]) =>
  pools.reduce((sum, pool) => sum + pool[account], 0)

const totalOf = (pools: readonly PoolBalance[]): BudgetBalance =>
  inSeconds({
    granted: sumOf(pools, 'granted'),
    available: sumOf(pools, 'available'),
    reserved: sumOf(pools, 'reserved'),
    spent: sumOf(pools, 'spent'),
  })

/** Seconds granted, reserved, spent and available in all; null where no budget is kept. */
export async function budgetTotal(app: App, workspaceId: string): Promise<BudgetBalance | null> {
  const pools = await budgetBalances(app.db, workspaceId)
  return pools.length > 0 ? totalOf(pools) : null
}

/** The budget as it stands: by pool, what is held and for which run sheets, and what was spent on what. */
export async function budgetView(app: App, { workspaceId }: Actor): Promise<BudgetView> {
  const pools = await budgetBalances(app.db, workspaceId)
  const holds = await budgetHolds(app.db, workspaceId)
  const subjects = await budgetSubjects(
    app.db,
    holds.map(({ runSheetId }) => runSheetId),
  )
  const machines = await listMachines(app.db, workspaceId, MOST_MACHINES, 0)
  return {
    isKept: pools.length > 0,
    total: totalOf(pools),
    pools: pools.map((pool) => ({
      machine: pool.machineId === null ? null : { id: pool.machineId, name: pool.machineName ?? '' },
      ...inSeconds(pool),
    })),
    holds: holds.map(({ runSheetId, microseconds, since, state }) => {
      const { machine, problem, runSheet } = subjects.get(runSheetId)!
      return {
        runSheet: { ...runSheet, state },
        ...{ machine, problem },
        seconds: microseconds / 1e6,
        since: since.toISOString(),
        until: new Date(since.getTime() + RESERVATION_DAYS * DAY_MS).toISOString(),
      }
    }),
    spent: (await budgetUse(app.db, workspaceId)).map(({ month, about, microseconds }) => ({
      month,
      machine: about.machine,
      problem: about.problem,
      seconds: microseconds / 1e6,
    })),
    machines: machines.map(({ machine: { id, name } }) => ({ id, name })),
  }
}

/** Entries of the ledger, newest first. */
export async function budgetEntriesOf(
  app: App,
  actor: Actor,
  { limit, cursor }: PageQuery,
): Promise<Page<BudgetEntryView>> {
  const offset = positionOf(cursor)
  const rows = await listBudgetEntries(app.db, actor.workspaceId, { limit: limit + 1, offset })
  return pageOf(rows.map(entryView), limit, offset)
}

const entryView = ({
  entry,
  by,
  available,
}: Awaited<ReturnType<typeof listBudgetEntries>>[number]): BudgetEntryView => ({
  number: entry.number,
  at: entry.at.toISOString(),
  move: entry.move,
  ...BUDGET_MOVES[entry.move],
  seconds: entry.microseconds / 1e6,
  pool: entry.machineId === null ? null : { id: entry.machineId, name: entry.machineName ?? '' },
  runSheet: entry.about && { id: entry.about.runSheet.id, number: entry.about.runSheet.number },
  problem: entry.about?.problem ?? null,
  by: by?.id ? by : null,
  remark: entry.remark,
  availableSeconds: available / 1e6,
})

const HEAD = 'number,at,move,from,to,seconds,machine,run sheet,problem,by,remark,available after (s)'

function line(entry: BudgetEntryView): string {
  const { number, at, move, from, to, seconds, pool, runSheet, problem, by, remark, availableSeconds } = entry
  const words = [problem?.name, by?.name, remark].map((text) => csvWords(text ?? ''))
  const machine = csvWords(pool?.name ?? 'any')
  const about = runSheet ? `RS-${runSheet.number}` : ''
  return `${[number, at, move, from, to, seconds, machine, about, ...words, availableSeconds].join(',')}\n`
}

/** The whole ledger as CSV, newest first; seconds to the microsecond. */
export async function budgetFile(app: App, actor: Actor): Promise<string> {
  const { items } = await budgetEntriesOf(app, actor, { limit: MOST_ROWS })
  return `${HEAD}\n${items.map(line).join('')}`
}
