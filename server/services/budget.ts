import { randomUUID } from 'node:crypto'
import type { PlannedEntry, PoolAmount } from '../../shared/budget'
import { planRelease, planReservation, planSettlement, RESERVATION_DAYS } from '../../shared/budget'
import { DomainError } from '../../shared/errors'
import type { Grant } from '../../shared/schemas/budget'
import type { BudgetLeft } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { BudgetSubject, PoolBalance } from '../database/repositories/budget'
import {
  budgetBalances,
  budgetHolds,
  budgetSubjectOf,
  budgetSubjects,
  hasBudgetEntries,
  insertBudgetEntries,
  lockBudget,
} from '../database/repositories/budget'
import { nextNumber } from '../database/repositories/counters'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { machineRow } from './machine-graphs'

const DAY_MS = 86_400_000

/** Microseconds that a run is held to need: its estimate, rounded up. */
const neededFor = ({ machineTimeMilliseconds }: Pick<RunSheetRow, 'machineTimeMilliseconds'>): number =>
  Math.ceil(Number((machineTimeMilliseconds * 1000).toFixed(3)))

/** A length of time for a sentence: `24 ms`, `1.5 s`. */
function timeText(microseconds: number): string {
  const [value, unit] =
    Math.abs(microseconds) < 1000
      ? [microseconds, 'µs']
      : Math.abs(microseconds) < 1e6
        ? [microseconds / 1000, 'ms']
        : [microseconds / 1e6, 's']
  return `${Number(value.toPrecision(4))} ${unit}`
}

interface Entered {
  workspaceId: string
  /** Null: the server itself, at the end of a time. */
  by: string | null
  remark: string
  about: BudgetSubject | null
  names: ReadonlyMap<string | null, string | null>
}

async function enter(app: App, tx: Db, planned: readonly PlannedEntry[], about: Entered): Promise<void> {
  const at = app.now()
  const rows = []
  for (const { move, machineId, microseconds } of planned)
    rows.push({
      id: randomUUID(),
      workspaceId: about.workspaceId,
      number: await nextNumber(tx, about.workspaceId, 'budget entry'),
      ...{ move, machineId, microseconds, at },
      machineName: machineId === null ? null : (about.names.get(machineId) ?? null),
      runSheetId: about.about?.runSheet.id ?? null,
      about: about.about,
      by: about.by,
      remark: about.remark,
    })
  await insertBudgetEntries(tx, rows)
}

/**
 * Grants machine time, or takes back what is neither reserved nor spent (below 0 seconds).
 * @throws DomainError for a machine of another workspace, and where less is left than is to be taken back
 */
export async function grantTime(app: App, actor: Actor, { seconds, machineId, remark }: Grant): Promise<void> {
  const name = machineId === null ? null : (await machineRow(app, actor, machineId)).name
  const microseconds = Math.round(Math.abs(seconds) * 1e6)
  const { workspaceId, userId: by } = actor
  await app.db.transaction(async (tx) => {
    await lockBudget(tx, workspaceId)
    const pools = await budgetBalances(tx, workspaceId)
    const left = pools.find((pool) => pool.machineId === machineId)?.available ?? 0
    if (seconds < 0 && left < microseconds)
      throw new DomainError(
        'wrong state',
        'budget.taken',
        `${timeText(Math.max(0, left))} of ${name ? `${name}’s time` : 'the time for any machine'} is neither reserved nor spent, so no more than that can be taken back.`,
      )
    const move = seconds < 0 ? ('take back' as const) : ('grant' as const)
    const names = new Map([[machineId, name]])
    await enter(app, tx, [{ move, machineId, microseconds }], { workspaceId, by, remark, about: null, names })
  })
}

const amounts = (pools: readonly PoolBalance[], account: 'available' | 'reserved'): PoolAmount[] =>
  pools.map((pool) => ({ machineId: pool.machineId, microseconds: pool[account] }))

const namesOf = (pools: readonly PoolBalance[]): Entered['names'] =>
  new Map(pools.map((pool) => [pool.machineId, pool.machineName]))

/** What the ledger holds for one run sheet and has for its machine; null as long as nothing was ever granted. */
async function standing(tx: Db, sheet: Pick<RunSheetRow, 'id' | 'workspaceId'>) {
  await lockBudget(tx, sheet.workspaceId)
  if (!(await hasBudgetEntries(tx, sheet.workspaceId))) return null
  const [pools, own] = [
    await budgetBalances(tx, sheet.workspaceId),
    await budgetBalances(tx, sheet.workspaceId, sheet.id),
  ]
  const about = await budgetSubjectOf(tx, sheet.id)
  const names = namesOf(pools)
  // The machine’s own time was taken first and is spent first.
  const ofAny = ({ machineId }: PoolAmount) => Number(machineId === null)
  const held = amounts(own, 'reserved')
    .filter(({ microseconds }) => microseconds > 0)
    .sort((a, b) => ofAny(a) - ofAny(b))
  return { pools, about, names, held }
}

/**
 * Holds the estimated machine time of a run sheet that is being approved, or issued after its hold ended, in the
 * transaction that does so. Does nothing where no budget is kept, or where time is held already.
 * @throws DomainError where less is left than the run needs
 */
export async function reserveTime(app: App, tx: Db, sheet: RunSheetRow, by: string): Promise<void> {
  const budget = await standing(tx, sheet)
  if (!budget || budget.held.length > 0) return
  const { pools, about, names } = budget
  const needed = neededFor(sheet)
  const planned = planReservation(amounts(pools, 'available'), about.machine.id, needed)
  if (!planned)
    throw new DomainError(
      'wrong state',
      'budget.short',
      `RS-${sheet.number} needs about ${timeText(needed)} of machine time; ${timeText(leftOn(pools, about.machine.id))} is left for ${about.machine.name}. Grant more on the page Budget, or send it back to ask for fewer reads.`,
    )
  await enter(app, tx, planned, { workspaceId: sheet.workspaceId, by, remark: '', about, names })
}

const leftOn = (pools: readonly PoolBalance[], machineId: string): number =>
  pools
    .filter((pool) => pool.machineId === null || pool.machineId === machineId)
    .reduce((sum, { available }) => sum + Math.max(0, available), 0)

/** Frees what is held for a run sheet that is no longer approved. */
export async function releaseTime(
  app: App,
  tx: Db,
  sheet: Pick<RunSheetRow, 'id' | 'workspaceId'>,
  { by, remark }: Pick<Entered, 'by' | 'remark'>,
): Promise<void> {
  const budget = await standing(tx, sheet)
  if (!budget) return
  const { held, about, names } = budget
  await enter(app, tx, planRelease(held), { workspaceId: sheet.workspaceId, by, remark, about, names })
}

/**
 * Enters what a run took when its samples come back: the machine time that they state, else the estimate.
 * @param seconds as stated with the samples
 */
export async function settleTime(
  app: App,
  tx: Db,
  sheet: RunSheetRow,
  { seconds, by }: { seconds: number | null; by: string },
): Promise<void> {
  const budget = await standing(tx, sheet)
  if (!budget) return
  const { pools, held, about, names } = budget
  const actual = seconds === null ? neededFor(sheet) : Math.round(seconds * 1e6)
  const own = pools.some(({ machineId }) => machineId === about.machine.id) ? about.machine.id : null
  const remark = seconds === null ? 'the estimate: the samples state no machine time' : ''
  const { workspaceId } = sheet
  await enter(app, tx, planSettlement(held, actual, own), { workspaceId, by, remark, about, names })
}

/** Frees what has been held for too long. */
export async function sweepReservations(app: App): Promise<void> {
  const before = app.now().getTime() - RESERVATION_DAYS * DAY_MS
  const remark = `not used within ${RESERVATION_DAYS} days`
  for (const { workspaceId, runSheetId, since } of await budgetHolds(app.db)) {
    if (since.getTime() > before) continue
    await app.db.transaction(async (tx) => {
      await lockBudget(tx, workspaceId)
      const held = amounts(await budgetBalances(tx, workspaceId, runSheetId), 'reserved')
      const about = (await budgetSubjects(tx, [runSheetId])).get(runSheetId)!
      const names = namesOf(await budgetBalances(tx, workspaceId))
      await enter(app, tx, planRelease(held), { workspaceId, by: null, remark, about, names })
    })
  }
}

/** What is left for the machine of a run sheet; null where no budget is kept. */
export async function budgetLeft(app: App, sheet: RunSheetRow, machineId: string): Promise<BudgetLeft | null> {
  const pools = await budgetBalances(app.db, sheet.workspaceId)
  if (pools.length === 0) return null
  const own = await budgetBalances(app.db, sheet.workspaceId, sheet.id)
  const heldSeconds = own.reduce((sum, { reserved }) => sum + reserved, 0) / 1e6
  return { leftSeconds: leftOn(pools, machineId) / 1e6, heldSeconds }
}
