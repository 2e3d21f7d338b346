import { z } from 'zod'
import type { BudgetAccount, BudgetMove } from '../budget'
import type { Person } from './common'
import { idSchema, pageQuerySchema, textSchema } from './common'
import type { RunSheetState } from './run-sheets'

/** A hundred years of seconds; in microseconds still exact. */
const MOST_SECONDS = 100 * 366 * 86_400

export const grantSchema = z.object({
  /** Machine time in seconds, to the microsecond; below 0 takes back what is not reserved or spent. */
  seconds: z
    .number()
    .min(-MOST_SECONDS, 'at most a hundred years at once')
    .max(MOST_SECONDS, 'at most a hundred years at once')
    .refine((seconds) => Math.round(seconds * 1e6) !== 0, 'give a number of seconds other than 0'),
  /** The machine that it is for; null or left out: any machine. */
  machineId: idSchema.nullable().default(null),
  remark: textSchema(500).default(''),
})
export type Grant = z.infer<typeof grantSchema>

export const budgetEntriesQuerySchema = pageQuerySchema.extend({ format: z.enum(['json', 'csv']).default('json') })

/** Seconds on each account; granted is what the other three come to. */
export type BudgetBalance = Record<`${BudgetAccount}Seconds`, number>

export interface BudgetPool extends BudgetBalance {
  /** Null: time for any machine. */
  machine: Person | null
}

/** What is held for an approved run sheet. */
export interface BudgetHold {
  runSheet: { id: string; number: number; name: string; state: RunSheetState | null }
  machine: Person
  problem: { id: string; number: number; name: string }
  seconds: number
  since: string
  /** From then on it is free again. */
  until: string
}

/** Machine time spent on one machine for one problem in one month (UTC). */
export interface BudgetUse {
  /** `2026-12` */
  month: string
  machine: Person
  problem: { id: string; number: number; name: string }
  seconds: number
}

export interface BudgetView {
  /** From the first grant on run sheets are approved within the budget only. */
  isKept: boolean
  total: BudgetBalance
  pools: BudgetPool[]
  holds: BudgetHold[]
  spent: BudgetUse[]
  /** Machines that time can be granted for. */
  machines: Person[]
}

export interface BudgetEntryView {
  number: number
  at: string
  move: BudgetMove
  from: BudgetAccount
  to: BudgetAccount
  seconds: number
  /** Null: time for any machine. */
  pool: Person | null
  runSheet: { id: string; number: number } | null
  problem: { id: string; number: number; name: string } | null
  by: Person | null
  remark: string
  /** Available in the pool after it. */
  availableSeconds: number
}
