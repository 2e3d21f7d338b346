import { sql } from 'drizzle-orm'
import type { Db } from '../client'
import { counters } from '../schema'

/** The next running number of a kind within a scope, from 1; taken in the transaction that uses it. */
export async function nextNumber(
  tx: Db,
  scope: string,
  kind: 'problem' | 'embedding' | 'run sheet' | 'return' | 'scan' | 'budget entry',
): Promise<number> {
  const rows = await tx
    .insert(counters)
    .values({ scope, kind, value: 1 })
    .onConflictDoUpdate({ target: [counters.scope, counters.kind], set: { value: sql`${counters.value} + 1` } })
    .returning({ value: counters.value })
  return rows[0]!.value
}
