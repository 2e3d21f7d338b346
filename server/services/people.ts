import { randomBytes, randomUUID, timingSafeEqual } from 'node:crypto'
import type { z } from 'zod'
import type { Page, PageQuery, Role } from '../../shared/schemas/common'
import type { EntranceView, MemberView, SessionView, setupSchema } from '../../shared/schemas/session'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import {
  anyUser,
  countThings,
  findRoles,
  findUser,
  findWorkspace,
  insertMembership,
  insertUser,
  insertWorkspace,
  keepFact,
  listMembers,
  listWorkspacesOf,
  onlyWorkspaceName,
  readFact,
  takeFact,
} from '../database/repositories/people'
import { readPage } from '../database/repositories/pages'
import { awayFor } from '../database/repositories/stand-ins'
import { budgetTotal } from './budget-view'
import { sendsMail } from './mail'
import { unreadNews } from './news'
import { requireGoodPassword } from './password-rules'

/** Of whoever makes a workspace. */
export const FOUNDER_ROLES = ['owner', 'developer', 'steward', 'reviewer'] as const satisfies readonly Role[]

const SETUP_CODE = 'setup code'

/** Hashing lives with the sign-in module; services get it passed in. */
export interface Passwords {
  hash(password: string): Promise<string>
  verify(hash: string, password: string): Promise<boolean>
}

/** The roles of a person in a workspace; undefined when not a member. */
export function rolesIn(app: App, actor: Actor): Promise<Role[] | undefined> {
  return findRoles(app.db, actor.workspaceId, actor.userId)
}

export async function sessionView(app: App, actor: Actor, roles: readonly Role[]): Promise<SessionView> {
  const [user, workspace, counts] = [
    await findUser(app.db, actor.userId),
    await findWorkspace(app.db, actor.workspaceId),
    await countThings(app.db, actor.workspaceId),
  ]
  if (!user || !workspace) throw new DomainError('unauthenticated', 'session.ended', 'This account no longer exists.')
  return {
    person: { id: user.id, name: user.name, email: user.email },
    workspace: { id: workspace.id, name: workspace.name, deletesAt: workspace.deletesAt?.toISOString() ?? null },
    workspaces: await listWorkspacesOf(app.db, user.id),
    roles: [...roles],
    reviewsFor: await awayFor(app.db, actor.workspaceId, user.id, app.now()),
    counts,
    ...(await unreadNews(app, actor)),
    budget: await budgetTotal(app, actor.workspaceId),
  }
}

export async function entranceView(app: App): Promise<EntranceView> {
  return {
    setupNeeded: !(await anyUser(app.db)),
    demo: app.demo,
    sendsMail: await sendsMail(app),
    workspace: await onlyWorkspaceName(app.db),
    provider: app.provider?.name ?? null,
  }
}

/** Members of the workspace by name. */
export function membersOf(app: App, { workspaceId }: Actor, query: PageQuery): Promise<Page<MemberView>> {
  return readPage(
    query,
    ({ limit, offset }) => listMembers(app.db, workspaceId).limit(limit).offset(offset),
    (row) => ({ ...row, since: row.since.toISOString() }),
  )
}

/** On an empty installation: the one-time code that opens the first account; undefined once there is one. */
export async function setupCode(app: App): Promise<string | undefined> {
  if (await anyUser(app.db)) return undefined
  const fresh = randomBytes(9).toString('base64url')
  return keepFact(app.db, SETUP_CODE, fresh)
}

/** Creates the first workspace with its owner, once, for whoever holds the code. */
export async function setUp(app: App, passwords: Passwords, input: z.infer<typeof setupSchema>): Promise<Actor> {
  const code = await readFact(app.db, SETUP_CODE)
  const given = Buffer.from(input.code)
  const expected = Buffer.from(code ?? '')
  if (!code || given.length !== expected.length || !timingSafeEqual(given, expected))
    throw new DomainError(
      'forbidden',
      'setup.code',
      'This is not the code on the server’s console, or it was used already.',
    )
  requireGoodPassword(input.password, input)
  const passwordHash = await passwords.hash(input.password)
  return app.db.transaction(async (tx) => {
    if (!(await takeFact(tx, SETUP_CODE)))
      throw new DomainError('wrong state', 'setup.done', 'The first account exists already. Sign in.')
    const workspaceId = await createWorkspace(app, tx, input.workspace)
    const userId = await createAccount(app, tx, {
      ...input,
      passwordHash,
      workspaceId,
      roles: [...FOUNDER_ROLES],
    })
    return { userId, workspaceId }
  })
}

export async function createWorkspace(app: App, tx: Db, name: string): Promise<string> {
  const id = randomUUID()
  await insertWorkspace(tx, { id, name, createdAt: app.now() })
  return id
}

export async function createAccount(
  app: App,
  tx: Db,
  account: { name: string; email: string; passwordHash: string | null; workspaceId: string; roles: Role[] },
): Promise<string> {
  const id = randomUUID()
  const { name, email, passwordHash, workspaceId, roles } = account
  await insertUser(tx, { id, name, email, passwordHash, createdAt: app.now() })
  await insertMembership(tx, { workspaceId, userId: id, roles, createdAt: app.now() })
  return id
}
