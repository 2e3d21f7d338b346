import { and, eq, inArray, lte } from 'drizzle-orm'
import type { BridgeCallState } from '../../../shared/schemas/bridges'
import type { Db } from '../client'
import { bridgeCalls } from '../schema'

export type BridgeCallRow = typeof bridgeCalls.$inferSelect

/** States in which samples of a call may still come. */
const AWAITED: readonly BridgeCallState[] = ['waiting', 'taken', 'given up']

/** The call of a run sheet: there is at most one, which is sent again. */
export async function findCallOf(db: Db, runSheetId: string): Promise<BridgeCallRow | undefined> {
  return (await db.select().from(bridgeCalls).where(eq(bridgeCalls.runSheetId, runSheetId)))[0]
}

/** Of any workspace, for whoever holds a token of it. */
export async function findCall(db: Db, id: string): Promise<BridgeCallRow | undefined> {
  return (await db.select().from(bridgeCalls).where(eq(bridgeCalls.id, id)))[0]
}

export async function insertCall(tx: Db, row: typeof bridgeCalls.$inferInsert): Promise<void> {
  await tx.insert(bridgeCalls).values(row)
}

/** Changes a call only while it is in one of the states given; false when it no longer is. */
export async function updateCall(
  db: Db,
  id: string,
  states: readonly BridgeCallState[],
  set: Partial<typeof bridgeCalls.$inferInsert>,
): Promise<boolean> {
  const rows = await db
    .update(bridgeCalls)
    .set(set)
    .where(and(eq(bridgeCalls.id, id), inArray(bridgeCalls.state, [...states])))
    .returning({ id: bridgeCalls.id })
  return rows.length === 1
}

/** Notes what came for a call; false when nothing is awaited any more. */
export const answerCall = (
  tx: Db,
  id: string,
  set: Pick<Partial<BridgeCallRow>, 'state' | 'returnId' | 'returnedDigest' | 'refusal'>,
): Promise<boolean> => updateCall(tx, id, AWAITED, { ...set, nextAttemptAt: null })

/** Ends the call of a run sheet whose samples came by hand. */
export async function endCallOf(tx: Db, runSheetId: string): Promise<void> {
  const open = and(eq(bridgeCalls.runSheetId, runSheetId), inArray(bridgeCalls.state, [...AWAITED, 'refused']))
  await tx.update(bridgeCalls).set({ state: 'ended', nextAttemptAt: null }).where(open)
}

/**
 * Takes the call that is due for longest and counts an attempt. It is due again at `lostAt`, so that no other process
 * takes it meanwhile and one that is lost with its process is tried again.
 */
export async function claimDueCall(db: Db, now: Date, lostAt: Date): Promise<BridgeCallRow | undefined> {
  return db.transaction(async (tx) => {
    const [row] = await tx
      .select()
      .from(bridgeCalls)
      .where(and(eq(bridgeCalls.state, 'waiting'), lte(bridgeCalls.nextAttemptAt, now)))
      .orderBy(bridgeCalls.nextAttemptAt)
      .limit(1)
      .for('update', { skipLocked: true })
    if (!row) return undefined
    const claimed = { attempts: row.attempts + 1, nextAttemptAt: lostAt }
    await tx.update(bridgeCalls).set(claimed).where(eq(bridgeCalls.id, row.id))
    return { ...row, ...claimed }
  })
}

/** Changes a call for whoever claimed it, while nobody else has since and nothing came for it. */
export async function updateClaimed(
  db: Db,
  { id, attempts }: Pick<BridgeCallRow, 'id' | 'attempts'>,
  set: Partial<typeof bridgeCalls.$inferInsert>,
): Promise<boolean> {
  const rows = await db
    .update(bridgeCalls)
    .set(set)
    .where(and(eq(bridgeCalls.id, id), eq(bridgeCalls.attempts, attempts), eq(bridgeCalls.state, 'waiting')))
    .returning({ id: bridgeCalls.id })
  return rows.length === 1
}

/** Keeps how tries went, whatever came for the call meanwhile. */
export async function keepTries(db: Db, id: string, tries: BridgeCallRow['tries']): Promise<void> {
  await db.update(bridgeCalls).set({ tries }).where(eq(bridgeCalls.id, id))
}
