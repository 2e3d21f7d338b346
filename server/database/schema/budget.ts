import { bigint, index, integer, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { BudgetMove } from '../../../shared/budget'
import type { Person } from '../../../shared/schemas/common'
import { id, moment } from './columns'
import { users } from './people'
import { workspaceId } from './references'

/** What an entry is about, with the names of that time: it outlives the things themselves. */
export interface BudgetSubject {
  machine: Person
  problem: { id: string; number: number; name: string }
  runSheet: { id: string; number: number; name: string }
}

/**
 * The ledger of machine time: each entry moves time from one account to another. A trigger refuses any change, and any
 * deletion but together with the workspace.
 */
export const budgetEntries = pgTable(
  'budget_entries',
  {
    id: id(),
    workspaceId: workspaceId(),
    number: integer().notNull(),
    move: text().$type<BudgetMove>().notNull(),
    /** The pool: time of one machine, or of any. */
    machineId: text(),
    machineName: text(),
    microseconds: bigint({ mode: 'number' }).notNull(),
    runSheetId: text(),
    about: jsonb().$type<BudgetSubject>(),
    by: text().references(() => users.id),
    remark: text().notNull(),
    at: moment().notNull(),
  },
  (table) => [uniqueIndex().on(table.workspaceId, table.number), index().on(table.workspaceId, table.runSheetId)],
)
