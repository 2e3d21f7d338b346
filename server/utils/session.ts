import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import type { SignIn } from '../../shared/audit'
import type { Actor, App } from '../app'
import { noteSignIn } from '../services/sign-in-trail'
import { leaveSession, openSession } from '../services/sessions'

const MAX_USER_AGENT = 300
const MAX_ADDRESS = 64

/**
 * Address that a request comes from: of the connection, or, where `TRUST_PROXY` says that a reverse proxy stands before
 * this process, the one that the proxy added. What stands before it in the header may be invented by the sender.
 */
export function addressOf(event: H3Event): string {
  const forwarded = process.env.TRUST_PROXY === 'true' ? getHeader(event, 'x-forwarded-for') : undefined
  const address = forwarded?.split(',').at(-1)?.trim() || event.node.req.socket.remoteAddress || 'unknown'
  return address.replace(/^::ffff:/, '').slice(0, MAX_ADDRESS)
}

async function endHeld(event: H3Event, app: App): Promise<void> {
  const { secure } = await getUserSession(event)
  const left = secure?.sessionId ? await leaveSession(app, secure.sessionId) : undefined
  if (left) await noteSignIn(app, left, 'out', addressOf(event))
}

/** Signs somebody in with this browser; whoever was signed in with it no longer is. */
export async function enter(event: H3Event, app: App, actor: Actor, how: SignIn): Promise<void> {
  await endHeld(event, app)
  const userAgent = (getHeader(event, 'user-agent') ?? '').slice(0, MAX_USER_AGENT)
  const sessionId = await openSession(app, actor, { userAgent, address: addressOf(event) })
  await replaceUserSession(event, { secure: { sessionId } })
  await noteSignIn(app, actor, how, addressOf(event))
}

/** Ends the session of this browser, if it has one. */
export async function leave(event: H3Event, app: App): Promise<void> {
  await endHeld(event, app)
  await clearUserSession(event)
}
