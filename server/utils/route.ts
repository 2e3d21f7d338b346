import type { EventHandlerRequest, H3Event } from 'h3'
import { defineEventHandler } from 'h3'
import type { Role } from '../../shared/schemas/common'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { rolesIn } from '../services/people'
import { useApp } from './app'
import { toHttpError } from './http'

export interface RouteContext extends Actor {
  app: App
  roles: readonly Role[]
}

type Handler<T> = (event: H3Event<EventHandlerRequest>, context: RouteContext) => Promise<T> | T

async function mapped<T>(work: () => Promise<T> | T): Promise<T> {
  try {
    return await work()
  } catch (error) {
    throw error instanceof DomainError ? toHttpError(error) : error
  }
}

/**
 * The one way to define a route behind sign-in: it finds out who asks, in which workspace and with which roles, and
 * refuses unless one of the allowed roles is held. `member` allows every role.
 */
export function defineRoute<T>(allowed: readonly Role[] | 'member', handler: Handler<T>) {
  return defineEventHandler((event) =>
    mapped(async () => {
      const app = await useApp()
      const { user } = await getUserSession(event)
      if (!user) throw new DomainError('unauthenticated', 'session.none', 'Sign in first.')
      const roles = await rolesIn(app, { userId: user.id, workspaceId: user.workspaceId })
      if (!roles)
        throw new DomainError(
          'unauthenticated',
          'session.ended',
          'This account no longer belongs to the workspace. Sign in again.',
        )
      if (allowed !== 'member' && !roles.some((role) => allowed.includes(role)))
        throw new DomainError(
          'forbidden',
          'role.missing',
          `This needs the role ${allowed.join(' or ')}; you hold ${roles.join(', ')}.`,
        )
      return handler(event, { app, userId: user.id, workspaceId: user.workspaceId, roles })
    }),
  )
}

/** A route that anyone may call: sign-in, first set-up, health. */
export function definePublicRoute<T>(handler: (event: H3Event<EventHandlerRequest>, app: App) => Promise<T> | T) {
  return defineEventHandler((event) => mapped(async () => handler(event, await useApp())))
}
