import type { EventHandlerRequest, H3Event } from 'h3'
import { defineEventHandler } from 'h3'
import type { Role } from '../../shared/schemas/common'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { rolesIn } from '../services/people'
import { tokenCaller } from '../services/tokens'
import { useApp } from './app'
import { bearerOf } from './bearer'
import { toHttpError } from './http'

interface Caller extends Actor {
  /** Those of the person, or the one of the token. */
  roles: readonly Role[]
  /** Null where somebody is signed in. */
  tokenId: string | null
}

interface RouteContext extends Caller {
  app: App
}

type Handler<T> = (event: H3Event<EventHandlerRequest>, context: RouteContext) => Promise<T> | T

async function mapped<T>(work: () => Promise<T> | T): Promise<T> {
  try {
    return await work()
  } catch (error) {
    throw error instanceof DomainError ? toHttpError(error) : error
  }
}

async function sessionCaller(event: H3Event, app: App): Promise<Caller> {
  const { user } = await getUserSession(event)
  if (!user) throw new DomainError('unauthenticated', 'session.none', 'Sign in first.')
  const roles = await rolesIn(app, { userId: user.id, workspaceId: user.workspaceId })
  if (!roles)
    throw new DomainError(
      'unauthenticated',
      'session.ended',
      'This account no longer belongs to the workspace. Sign in again.',
    )
  return { userId: user.id, workspaceId: user.workspaceId, roles, tokenId: null }
}

async function callerOf(event: H3Event, app: App): Promise<Caller> {
  const token = bearerOf(event)
  return token === undefined ? sessionCaller(event, app) : tokenCaller(app, token)
}

type Allowed = readonly Role[] | 'member'

function requireRole(allowed: Allowed, { roles, tokenId }: Caller): void {
  if (allowed === 'member' || roles.some((role) => allowed.includes(role))) return
  const needed = `This needs the role ${allowed.join(' or ')}`
  throw new DomainError(
    'forbidden',
    'role.missing',
    tokenId ? `${needed}; the token has the role ${roles[0]}.` : `${needed}; you hold ${roles.join(', ')}.`,
  )
}

/**
 * The one way to define a route behind sign-in: it finds out who asks, by session or by token, in which workspace and with
 * which roles, and refuses unless one of the allowed roles is held. `member` allows every role.
 */
export function defineRoute<T>(allowed: Allowed, handler: Handler<T>) {
  return defineEventHandler((event) =>
    mapped(async () => {
      const app = await useApp()
      const caller = await callerOf(event, app)
      requireRole(allowed, caller)
      return handler(event, { app, ...caller })
    }),
  )
}

/** A route for people who are signed in, not for tokens: what concerns people, accounts and tokens themselves. */
export function defineSessionRoute<T>(allowed: Allowed, handler: Handler<T>) {
  return defineRoute(allowed, (event, context) => {
    if (context.tokenId)
      throw new DomainError('forbidden', 'token.session-only', 'Tokens may not do this. Sign in and do it yourself.')
    return handler(event, context)
  })
}

/** A route that anyone may call: sign-in, first set-up, health. */
export function definePublicRoute<T>(handler: (event: H3Event<EventHandlerRequest>, app: App) => Promise<T> | T) {
  return defineEventHandler((event) => mapped(async () => handler(event, await useApp())))
}
