import type { BudgetAccount, BudgetMove } from '#shared/budget'
import type { BudgetBalance, BudgetUse } from '#shared/schemas/budget'
import type { ChartSeries } from '../ui/chart/types'
import type { Fact, MarkKind } from '../ui/parts'
import { formatCount, formatPercent, MINUS } from '../format'
import { formatDuration } from '../formatTime'

/** Machine time, also where more was spent than granted: `230 ms`, `−6 ms`. */
export const machineTime = (seconds: number): string =>
  seconds < 0 ? `${MINUS}${formatDuration(-seconds, 4)}` : formatDuration(seconds, 4)

/** `any machine`, or its name. */
export const poolName = (pool: { name: string } | null): string => pool?.name ?? 'any machine'

const MOVES: Record<BudgetMove, { words: string; mark: MarkKind }> = {
  grant: { words: 'granted', mark: 'passed' },
  'take back': { words: 'taken back', mark: 'computed' },
  reserve: { words: 'held for', mark: 'computed' },
  settle: { words: 'spent on', mark: 'passed' },
  release: { words: 'freed from', mark: 'computed' },
  charge: { words: 'spent over the estimate on', mark: 'caution' },
}

/** The accounts as the page names them. */
export const ACCOUNT_WORDS: Record<BudgetAccount, string> = {
  granted: 'granted',
  available: 'free',
  reserved: 'held',
  spent: 'spent',
}

/** What an entry did, in words before the run sheet that it is about. */
export const moveWords = (move: BudgetMove): string => MOVES[move].words
export const moveMark = (move: BudgetMove): MarkKind => MOVES[move].mark

/** The strip of facts of the budget. */
export function budgetFacts(total: BudgetBalance, holds: number): Fact[] {
  const share = (seconds: number) => {
    if (total.grantedSeconds <= 0) return undefined
    const part = seconds / total.grantedSeconds
    // Rounded it would say that nothing is missing.
    if (part > 0.99 && part < 1) return `over ${formatPercent(0.99, { significant: 2 })} of it`
    return `${formatPercent(part, { significant: 2 })} of it`
  }
  return [
    { label: 'Granted', value: machineTime(total.grantedSeconds) },
    { label: 'Spent', value: machineTime(total.spentSeconds), note: share(total.spentSeconds) },
    {
      label: 'Held',
      value: machineTime(total.reservedSeconds),
      note: holds > 0 ? `for ${formatCount(holds, 'run sheet')}` : 'for nothing',
    },
    {
      label: 'Free',
      value: machineTime(total.availableSeconds),
      note: total.availableSeconds < 0 ? 'overspent' : share(total.availableSeconds),
    },
  ]
}

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

/** `2026-12` as `Dec 2026`. */
export function monthName(month: string): string {
  const [year, number] = month.split('-')
  return `${MONTHS[Number(number) - 1]} ${year}`
}

/** Every month from the first use to the last, also those without any, the oldest first. */
export function monthsOf(spent: readonly BudgetUse[]): string[] {
  const used = spent.map(({ month }) => month).sort()
  const months: string[] = []
  for (let month = used[0]; month && month <= used.at(-1)!; month = nextMonth(month)) months.push(month)
  return months
}

function nextMonth(month: string): string {
  const [year, number] = month.split('-').map(Number)
  return number === 12 ? `${year! + 1}-01` : `${year}-${String(number! + 1).padStart(2, '0')}`
}

/** Seconds spent in each month, a series for each machine. */
export function monthSeries(spent: readonly BudgetUse[]): ChartSeries[] {
  const months = monthsOf(spent)
  const machines = new Map(spent.map(({ machine }) => [machine.id, machine.name]))
  return [...machines].map(([id, name]) => ({
    name,
    points: months.map((month, x) => ({
      x,
      y: secondsOf(spent.filter((use) => use.month === month && use.machine.id === id)),
    })),
  }))
}

const secondsOf = (uses: readonly BudgetUse[]): number => uses.reduce((sum, { seconds }) => sum + seconds, 0)

export interface UseRow {
  id: string
  name: string
  /** Where the thing has a page. */
  to: string
  seconds: number
  share: number
}

/** What was spent on each machine or for each problem, the most first. */
export function useRows(spent: readonly BudgetUse[], by: 'machine' | 'problem'): UseRow[] {
  const total = secondsOf(spent)
  const rows = new Map<string, UseRow>()
  for (const use of spent) {
    const { id, name } = use[by]
    const to = by === 'machine' ? `/machines/${id}` : `/problems/${id}`
    const label = by === 'problem' ? `P-${use.problem.number} ${name}` : name
    const row = rows.get(id) ?? { id, name: label, to, seconds: 0, share: 0 }
    row.seconds += use.seconds
    row.share = total > 0 ? row.seconds / total : 0
    rows.set(id, row)
  }
  return [...rows.values()].sort((a, b) => b.seconds - a.seconds)
}
