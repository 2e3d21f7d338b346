import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery, Person, Role } from '../../shared/schemas/common'
import type { MakeStandIn, StandInView } from '../../shared/schemas/stand-ins'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { findRoles, lockWorkspace } from '../database/repositories/people'
import { readPage } from '../database/repositories/pages'
import { personOf } from '../database/repositories/problems'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import {
  awayFor,
  findStandIn,
  insertStandIn,
  listStandIns,
  overlappingStandIn,
  takeBackRow,
} from '../database/repositories/stand-ins'
import { standInEndedLetter, standInLetter } from '../mail/stand-in-letters'
import { tell } from './mail'

const DAY_MS = 86_400_000
const MOST_DAYS = 366

/** Who asks, with the roles they hold. */
interface Asking extends Actor {
  roles: readonly Role[]
}

const dayOf = (at: Date): string => at.toISOString().slice(0, 10)
/** The last day of what ends before a moment. */
const lastDay = (endsAt: Date): string => dayOf(new Date(endsAt.getTime() - DAY_MS))

/** Whose reviews are in whose hands, now and to come, the earliest first. */
export function standInsOf(app: App, { workspaceId }: Actor, query: PageQuery): Promise<Page<StandInView>> {
  const now = app.now()
  return readPage(
    query,
    (place) => listStandIns(app.db, workspaceId, now, place),
    ({ row, forWhom, by }) => ({
      id: row.id,
      for: forWhom,
      by,
      startsOn: dayOf(row.startsAt),
      endsOn: lastDay(row.endsAt),
      isOn: row.startsAt <= now,
    }),
  )
}

const refused = (code: string, path: string, message: string): DomainError =>
  new DomainError('not acceptable', `stand-in.${code}`, `Reviews cannot be handed over so: ${message}.`, [
    { path, message },
  ])

/** From the beginning of the first day to the end of the last, UTC. */
function timeOf(app: App, { startsOn, endsOn }: MakeStandIn): { startsAt: Date; endsAt: Date } {
  const [startsAt, endsAt] = [new Date(startsOn), new Date(Date.parse(endsOn) + DAY_MS)]
  if (endsAt <= startsAt) throw refused('days', 'endsOn', 'the last day is before the first')
  if (endsAt <= app.now()) throw refused('over', 'endsOn', 'the last day is over')
  if (endsAt.getTime() - startsAt.getTime() > MOST_DAYS * DAY_MS)
    throw refused('long', 'endsOn', `it is longer than ${MOST_DAYS} days`)
  return { startsAt, endsAt }
}

/** Who is named, that whoever asks may hand these reviews over, and that they are a reviewer's. */
async function requirePair(tx: Db, asking: Asking, forUserId: string, byUserId: string): Promise<void> {
  const { workspaceId, userId, roles } = asking
  const held = await findRoles(tx, workspaceId, forUserId)
  if (!held || !(await findRoles(tx, workspaceId, byUserId)))
    throw new DomainError('not found', 'member.missing', 'There is no such member of this workspace.')
  if (forUserId !== userId && !roles.includes('owner'))
    throw new DomainError('forbidden', 'stand-in.others', 'Only owners hand over the reviews of others.')
  if (!held.includes('reviewer')) throw refused('reviewer', 'forId', 'who is away is no reviewer')
  if (forUserId === byUserId) throw refused('same', 'byId', 'it has to be somebody else')
}

/**
 * Hands the reviews of a reviewer over to another member, from a day to a day.
 * @throws DomainError forbidden for the reviews of others, but by an owner
 */
export async function makeStandIn(app: App, asking: Asking, input: MakeStandIn): Promise<{ id: string }> {
  const { workspaceId, userId } = asking
  const { forId: forUserId = userId, byId: byUserId } = input
  const time = timeOf(app, input)
  const id = randomUUID()
  await app.db.transaction(async (tx) => {
    await lockWorkspace(tx, workspaceId)
    await requirePair(tx, asking, forUserId, byUserId)
    const row = {
      id,
      workspaceId,
      forUserId,
      byUserId,
      ...time,
      madeBy: userId,
      createdAt: app.now(),
      takenBackAt: null,
    }
    if (await overlappingStandIn(tx, row))
      throw new DomainError(
        'wrong state',
        'stand-in.overlaps',
        'Their reviews are in other hands on some of these days already. Take that back first.',
      )
    await insertStandIn(tx, row)
    const letter = standInLetter((await personOf(tx, forUserId)).name, input.startsOn, input.endsOn)
    await tell(app, tx, { workspaceId, by: userId }, new Map([[byUserId, letter]]))
  })
  return { id }
}

/** Takes reviews back into the reviewer's own hands, from now on. */
export async function takeBackStandIn(app: App, { workspaceId, userId, roles }: Asking, id: string): Promise<void> {
  await app.db.transaction(async (tx) => {
    const row = await findStandIn(tx, workspaceId, id)
    if (!row || row.endsAt <= app.now())
      throw new DomainError(
        'not found',
        'stand-in.missing',
        'There is nothing to take back; it may have ended already.',
      )
    if (row.forUserId !== userId && !roles.includes('owner'))
      throw new DomainError('forbidden', 'stand-in.others', 'Only owners take back the reviews of others.')
    await takeBackRow(tx, id, app.now())
    const letter = standInEndedLetter((await personOf(tx, row.forUserId)).name)
    await tell(app, tx, { workspaceId, by: userId }, new Map([[row.byUserId, letter]]))
  })
}

/** For whom somebody reviews now. */
export const reviewsFor = (app: App, { workspaceId, userId }: Actor): Promise<Person[]> =>
  awayFor(app.db, workspaceId, userId, app.now())

/**
 * By whose right somebody decides on a run sheet: their own as a reviewer, which is null, or that of a reviewer who is away
 * and did not prepare it.
 * @throws DomainError forbidden without either
 */
export async function reviewingFor(
  app: App,
  actor: Actor,
  { number, preparedBy }: RunSheetRow,
): Promise<Person | null> {
  if ((await findRoles(app.db, actor.workspaceId, actor.userId))?.includes('reviewer')) return null
  const away = await reviewsFor(app, actor)
  const person = away.find(({ id }) => id !== preparedBy)
  if (person && preparedBy !== actor.userId) return person
  throw new DomainError(
    'forbidden',
    away.length > 0 ? 'run-sheet.own' : 'role.missing',
    away.length > 0
      ? `You, or the reviewer for whom you review, prepared RS-${number}. Another reviewer decides.`
      : 'This needs the role reviewer, or the reviews of a reviewer who is away.',
  )
}
