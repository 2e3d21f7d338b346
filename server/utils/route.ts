import type { EventHandlerRequest, H3Event } from 'h3'
import { defineEventHandler, getHeader, setResponseHeader } from 'h3'
import type { Role } from '../../shared/schemas/common'
import { DomainError, TooManyError } from '../../shared/errors'
import { WORKSPACE_HEADER } from '../../shared/workspace-header'
import type { Actor, App } from '../app'
import { sessionCaller } from '../services/sessions'
import { reviewsFor } from '../services/stand-ins'
import { tokenCaller } from '../services/tokens'
import { requireShown } from '../services/workspaces'
import { useApp } from './app'
import { audited } from './audited'
import { bearerOf } from './bearer'
import { toHttpError } from './http'
import { answeredOnce, keyOf } from './once'
import { useRateLimiter } from './rates'
import { addressOf } from './session'

interface Caller extends Actor {
  /** Those of the person, or the one of the token. */
  roles: readonly Role[]
  /** Null where somebody is signed in. */
  tokenId: string | null
  /** Null where a token is used. */
  sessionId: string | null
}

interface RouteContext extends Caller {
  app: App
}

type Handler<T> = (event: H3Event<EventHandlerRequest>, context: RouteContext) => Promise<T> | T

async function mapped<T>(event: H3Event, work: () => Promise<T> | T): Promise<T> {
  try {
    return await work()
  } catch (error) {
    if (error instanceof TooManyError) setResponseHeader(event, 'retry-after', error.retryAfterSeconds)
    throw error instanceof DomainError ? toHttpError(error) : error
  }
}

async function signedInCaller(event: H3Event, app: App): Promise<Caller> {
  const { secure } = await getUserSession(event)
  if (!secure?.sessionId) throw new DomainError('unauthenticated', 'session.none', 'Sign in first.')
  const caller = await sessionCaller(app, secure.sessionId, addressOf(event))
  requireShown(caller, getHeader(event, WORKSPACE_HEADER))
  return { ...caller, tokenId: null }
}

async function callerOf(event: H3Event, app: App): Promise<Caller> {
  const token = bearerOf(event)
  const caller =
    token === undefined ? await signedInCaller(event, app) : { ...(await tokenCaller(app, token)), sessionId: null }
  if (event.context.callerDigest !== undefined) useRateLimiter().accept(event.context.callerDigest)
  return caller
}

type Allowed = readonly Role[] | 'member'

async function requireRole(app: App, allowed: Allowed, caller: Caller, orStandIn: boolean): Promise<void> {
  const { roles, tokenId } = caller
  if (allowed === 'member' || roles.some((role) => allowed.includes(role))) return
  if (orStandIn && tokenId === null && (await reviewsFor(app, caller)).length > 0) return
  const needed = `This needs the role ${allowed.join(' or ')}`
  throw new DomainError(
    'forbidden',
    'role.missing',
    tokenId ? `${needed}; the token has the role ${roles[0]}.` : `${needed}; you hold ${roles.join(', ')}.`,
  )
}

interface RouteOptions {
  /** The answer holds a secret: it is never kept, so that `Idempotency-Key` does nothing. */
  hasSecret?: boolean
  /** Somebody signed in who reviews in the place of a reviewer who is away is let in too. */
  orStandIn?: boolean
}

/**
 * The one way to define a route behind sign-in: it finds out who asks, by session or by token, in which workspace and with
 * which roles, and refuses unless one of the allowed roles is held. `member` allows every role. A POST with an
 * `Idempotency-Key` is answered once.
 */
export function defineRoute<T>(allowed: Allowed, handler: Handler<T>, options: RouteOptions = {}) {
  const { hasSecret = false, orStandIn = false } = options
  return defineEventHandler((event) =>
    mapped(event, async () => {
      const app = await useApp()
      const caller = await callerOf(event, app)
      await requireRole(app, allowed, caller, orStandIn)
      // What is answered from before was done before, and is in the audit trail already.
      const work = (): Promise<T> => audited(event, { app, ...caller }, () => handler(event, { app, ...caller }))
      const key = hasSecret ? undefined : keyOf(event)
      return key === undefined ? work() : answeredOnce(event, { app, actor: caller, key }, work)
    }),
  )
}

interface SignedInContext extends RouteContext {
  sessionId: string
}

type SessionHandler<T> = (event: H3Event<EventHandlerRequest>, context: SignedInContext) => Promise<T> | T

/** A route for people who are signed in, not for tokens: what concerns people, accounts and tokens themselves. */
export function defineSessionRoute<T>(allowed: Allowed, handler: SessionHandler<T>) {
  const forPeople: Handler<T> = (event, { sessionId, ...context }) => {
    if (sessionId === null)
      throw new DomainError('forbidden', 'token.session-only', 'Tokens may not do this. Sign in and do it yourself.')
    return handler(event, { ...context, sessionId })
  }
  return defineRoute(allowed, forPeople, { hasSecret: true })
}

/** A route that anyone may call: sign-in, first set-up, health. */
export function definePublicRoute<T>(handler: (event: H3Event<EventHandlerRequest>, app: App) => Promise<T> | T) {
  return defineEventHandler((event) => mapped(event, async () => handler(event, await useApp())))
}
