import type { SQL } from 'drizzle-orm'
import { aliasedTable, and, asc, eq, gt, isNull, lt, lte, or, sql } from 'drizzle-orm'
import type { Person } from '../../../shared/schemas/common'
import type { Db } from '../client'
import { memberships, standIns, users } from '../schema'
import type { Place } from './pages'

export type StandInRow = typeof standIns.$inferSelect

const away = aliasedTable(users, 'away')
const awayMembership = aliasedTable(memberships, 'away_membership')

const within = (workspaceId: string) => and(eq(standIns.workspaceId, workspaceId), isNull(standIns.takenBackAt))

export async function insertStandIn(tx: Db, row: StandInRow): Promise<void> {
  await tx.insert(standIns).values(row)
}

/** Of those that hold, the earliest first: both are members, who is away still reviews, and nobody took it back. */
function holding(db: Db, workspaceId: string, when: SQL | undefined) {
  return db
    .select({
      row: standIns,
      forWhom: { id: away.id, name: away.name },
      by: { id: users.id, name: users.name },
    })
    .from(standIns)
    .innerJoin(away, eq(away.id, standIns.forUserId))
    .innerJoin(users, eq(users.id, standIns.byUserId))
    .innerJoin(
      awayMembership,
      and(
        eq(awayMembership.workspaceId, standIns.workspaceId),
        eq(awayMembership.userId, standIns.forUserId),
        sql`'reviewer' = any(${awayMembership.roles})`,
      ),
    )
    .innerJoin(
      memberships,
      and(eq(memberships.workspaceId, standIns.workspaceId), eq(memberships.userId, standIns.byUserId)),
    )
    .where(and(within(workspaceId), when))
    .orderBy(asc(standIns.startsAt), asc(standIns.id))
}

/** Those that go on or are to come. */
export const listStandIns = (db: Db, workspaceId: string, now: Date, { limit, offset }: Place) =>
  holding(db, workspaceId, gt(standIns.endsAt, now)).limit(limit).offset(offset)

/** Those that go on now. */
export const standInsAt = (db: Db, workspaceId: string, now: Date) =>
  holding(db, workspaceId, and(lte(standIns.startsAt, now), gt(standIns.endsAt, now)))

/** For whom somebody reviews now. */
export async function awayFor(db: Db, workspaceId: string, byUserId: string, now: Date): Promise<Person[]> {
  const held = (await standInsAt(db, workspaceId, now)).filter(({ by }) => by.id === byUserId)
  return held.map(({ forWhom }) => forWhom)
}

/** One of a person that shares a day with the time given. */
export async function overlappingStandIn(
  tx: Db,
  { workspaceId, forUserId, startsAt, endsAt }: Pick<StandInRow, 'workspaceId' | 'forUserId' | 'startsAt' | 'endsAt'>,
): Promise<StandInRow | undefined> {
  const shares = and(lt(standIns.startsAt, endsAt), gt(standIns.endsAt, startsAt))
  const isTheirs = and(within(workspaceId), eq(standIns.forUserId, forUserId), shares)
  return (await tx.select().from(standIns).where(isTheirs).limit(1))[0]
}

/** One that was not taken back, over or not. */
export async function findStandIn(db: Db, workspaceId: string, id: string): Promise<StandInRow | undefined> {
  return (
    await db
      .select()
      .from(standIns)
      .where(and(within(workspaceId), eq(standIns.id, id)))
  )[0]
}

export async function takeBackRow(tx: Db, id: string, takenBackAt: Date): Promise<void> {
  await tx.update(standIns).set({ takenBackAt }).where(eq(standIns.id, id))
}

/** Ends what a person handed over, and with `asEither` what was handed to them too. */
export async function endStandInsOf(
  tx: Db,
  workspaceId: string,
  userId: string,
  { now, asEither }: { now: Date; asEither: boolean },
): Promise<void> {
  const isFor = eq(standIns.forUserId, userId)
  const theirs = asEither ? or(isFor, eq(standIns.byUserId, userId)) : isFor
  await tx
    .update(standIns)
    .set({ takenBackAt: now })
    .where(and(within(workspaceId), theirs))
}

/** Such as “Per Lind for Maud Okafor”. */
export async function standInLabel(db: Db, id: string): Promise<string | undefined> {
  const [pair] = await db
    .select({ by: users.name, forWhom: away.name })
    .from(standIns)
    .innerJoin(away, eq(away.id, standIns.forUserId))
    .innerJoin(users, eq(users.id, standIns.byUserId))
    .where(eq(standIns.id, id))
  return pair && `${pair.by} for ${pair.forWhom}`
}
