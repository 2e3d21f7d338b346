/*
 * Machine time as a double-entry ledger: every entry moves whole microseconds from one account to another, so that what
 * was granted is always what is available, reserved and spent together. Accounts are kept apart by pool: time for one
 * machine, and time for any machine (a pool of null).
 */

export const BUDGET_ACCOUNTS = ['granted', 'available', 'reserved', 'spent'] as const
export type BudgetAccount = (typeof BUDGET_ACCOUNTS)[number]

/** What an entry does, and between which accounts it moves time. */
export const BUDGET_MOVES = {
  grant: { from: 'granted', to: 'available' },
  'take back': { from: 'available', to: 'granted' },
  reserve: { from: 'available', to: 'reserved' },
  settle: { from: 'reserved', to: 'spent' },
  release: { from: 'reserved', to: 'available' },
  /** Spent without having been reserved: a run took longer than was estimated. */
  charge: { from: 'available', to: 'spent' },
} as const satisfies Record<string, { from: BudgetAccount; to: BudgetAccount }>
export type BudgetMove = keyof typeof BUDGET_MOVES
export const BUDGET_MOVE_NAMES = Object.keys(BUDGET_MOVES) as BudgetMove[]

/** Approved machine time that was not used is free again after so many days. */
export const RESERVATION_DAYS = 60

/** An amount of one pool, in microseconds. */
export interface PoolAmount {
  /** The machine whose time it is; null for time on any machine. */
  readonly machineId: string | null
  readonly microseconds: number
}

export interface PlannedEntry extends PoolAmount {
  readonly move: BudgetMove
}

/**
 * Where the machine time of a run on one machine comes from: that machine's own time first, then time for any machine.
 * @param available of the pools, in microseconds
 * @param needed whole microseconds
 * @returns the entries, or null where there is not enough
 */
export function planReservation(
  available: readonly PoolAmount[],
  machineId: string,
  needed: number,
): PlannedEntry[] | null {
  const entries: PlannedEntry[] = []
  let missing = needed
  for (const pool of [machineId, null]) {
    const there = available.find((one) => one.machineId === pool)?.microseconds ?? 0
    const microseconds = Math.max(0, Math.min(there, missing))
    if (microseconds > 0) entries.push({ move: 'reserve', machineId: pool, microseconds })
    missing -= microseconds
  }
  return missing > 0 ? null : entries
}

/** Entries that free what is held, whole. */
export const planRelease = (held: readonly PoolAmount[]): PlannedEntry[] =>
  held.filter(({ microseconds }) => microseconds > 0).map((one) => ({ ...one, move: 'release' as const }))

/**
 * What a run that came back does to what was held for it: as much as it took is spent, the rest is free again, and what
 * it took beyond is charged all the same, for it was used.
 * @param held reserved for the run, in microseconds
 * @param actual whole microseconds that the run took
 * @param chargedTo the pool that bears what was not reserved
 */
export function planSettlement(held: readonly PoolAmount[], actual: number, chargedTo: string | null): PlannedEntry[] {
  const entries: PlannedEntry[] = []
  let left = actual
  for (const { machineId, microseconds } of held) {
    const spent = Math.min(microseconds, left)
    if (spent > 0) entries.push({ move: 'settle', machineId, microseconds: spent })
    if (microseconds > spent) entries.push({ move: 'release', machineId, microseconds: microseconds - spent })
    left -= spent
  }
  if (left > 0) entries.push({ move: 'charge', machineId: chargedTo, microseconds: left })
  return entries
}
