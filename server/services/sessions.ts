import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery, Role } from '../../shared/schemas/common'
import type { SignedInView } from '../../shared/schemas/account'
import type { Actor, App } from '../app'
import { readPage } from '../database/repositories/pages'
import type { SessionRow } from '../database/repositories/sessions'
import {
  deleteExpiredSessions,
  deleteOtherSessions,
  deleteSession,
  findSession,
  insertSession,
  listSessions,
  noteSessionUse,
} from '../database/repositories/sessions'
import { rolesIn } from './people'

const DAY_MS = 24 * 60 * 60 * 1000
/** A session ends when it was not used for so long, and in any case so long after signing in. */
const UNUSED_MS = 14 * DAY_MS
const LONGEST_MS = 90 * DAY_MS
/** Its last use is written down no more often than this. */
const USE_NOTED_MS = 60_000

/** Where somebody signs in from, as far as the request says. */
export interface Device {
  userAgent: string
  /** Address of the network. */
  address: string
}

/** Who a request of somebody signed in is from. */
export interface SessionCaller extends Actor {
  sessionId: string
  roles: readonly Role[]
}

const endOf = (createdAt: Date, seenAt: Date): Date =>
  new Date(Math.min(seenAt.getTime() + UNUSED_MS, createdAt.getTime() + LONGEST_MS))

/** Signs somebody in. @returns id of the session, for the sealed cookie */
export async function openSession(app: App, actor: Actor, device: Device): Promise<string> {
  const now = app.now()
  const id = randomUUID()
  const { userId, workspaceId } = actor
  await insertSession(app.db, {
    ...{ id, userId, workspaceId, ...device },
    ...{ createdAt: now, seenAt: now, expiresAt: endOf(now, now) },
  })
  return id
}

/**
 * Who asks with a session, and notes its use.
 * @throws DomainError unauthenticated, when it was ended, has expired, or its person left the workspace
 */
export async function sessionCaller(app: App, id: string, address: string): Promise<SessionCaller> {
  const now = app.now()
  const row = await findSession(app.db, id, now)
  if (!row)
    throw new DomainError('unauthenticated', 'session.ended', 'You are no longer signed in here. Sign in again.')
  const { userId, workspaceId } = row
  const roles = await rolesIn(app, { userId, workspaceId })
  if (!roles)
    throw new DomainError(
      'unauthenticated',
      'session.ended',
      'This account no longer belongs to the workspace. Sign in again.',
    )
  if (now.getTime() - row.seenAt.getTime() >= USE_NOTED_MS)
    await noteSessionUse(app.db, id, { address, seenAt: now, expiresAt: endOf(row.createdAt, now) })
  return { userId, workspaceId, sessionId: id, roles }
}

/** Where a person is signed in, last seen first. */
export function sessionsOf(app: App, userId: string, ownId: string, query: PageQuery): Promise<Page<SignedInView>> {
  return readPage(
    query,
    (place) => listSessions(app.db, userId, app.now(), place),
    ({ session, workspace }) => viewOf(session, workspace, session.id === ownId),
  )
}

const viewOf = (row: SessionRow, workspace: string, isThis: boolean): SignedInView => ({
  id: row.id,
  userAgent: row.userAgent,
  address: row.address,
  workspace,
  isThis,
  createdAt: row.createdAt.toISOString(),
  seenAt: row.seenAt.toISOString(),
})

/** Ends one of a person's own sessions. */
export async function endSession(app: App, userId: string, id: string): Promise<void> {
  if (!(await deleteSession(app.db, userId, id)))
    throw new DomainError('not found', 'session.missing', 'There is no such session; it may have ended already.')
}

/** Ends the session that a browser holds. @returns whose it was; undefined where it is no longer there */
export async function leaveSession(app: App, id: string): Promise<Actor | undefined> {
  const row = await findSession(app.db, id, app.now())
  if (!row || !(await deleteSession(app.db, row.userId, id))) return undefined
  return { userId: row.userId, workspaceId: row.workspaceId }
}

/** Signs a person out everywhere but here. */
export async function endOtherSessions(app: App, userId: string, keptId: string): Promise<void> {
  await deleteOtherSessions(app.db, userId, keptId)
}

export const sweepSessions = (app: App): Promise<void> => deleteExpiredSessions(app.db, app.now())
