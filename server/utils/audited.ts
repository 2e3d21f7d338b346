import type { H3Event } from 'h3'
import type { Deed } from '../../shared/audit'
import { DEEDS } from '../../shared/audit'
import type { Person } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import { knownOfThing, record } from '../services/audit'
import { addressOf } from './session'

interface Caller extends Actor {
  tokenId: string | null
}

const idIn = (answer: unknown): string | null => {
  const id = typeof answer === 'object' && answer !== null && 'id' in answer ? answer.id : null
  return typeof id === 'string' ? id : null
}

/** Where it was decided in the place of a reviewer who is away, that is part of the deed. */
function withStandIn(deed: Deed, answer: unknown): Deed {
  const away = typeof answer === 'object' && answer !== null && 'for' in answer ? (answer.for as Person | null) : null
  return away ? { ...deed, what: `${deed.what} (for ${away.name})` } : deed
}

/** For a route that only tried, and for work that failed once its answer had begun: there is nothing to be told of. */
export function noteNothingDone(event: H3Event): void {
  event.context.nothingDone = true
}

/** For a route whose answer was sent while it worked: what the work came to. */
export function noteOutcome(event: H3Event, outcome: unknown): void {
  event.context.outcome = outcome
}

/** Does the work of a route and, where it changed something, writes down who did it, to what, and from where. */
export async function audited<T>(
  event: H3Event,
  { app, ...caller }: Caller & { app: App },
  work: () => Promise<T> | T,
): Promise<T> {
  const deed = DEEDS[`${event.method} ${event.context.matchedRoute?.path ?? ''}`]
  if (!deed) return work()
  const named = deed.isOwn ? null : (event.context.params?.id ?? null)
  // What is deleted has no name afterwards; what is renamed is called by its new one.
  const known = event.method === 'DELETE' ? await knownOfThing(app, deed, named) : undefined
  const answer = await work()
  if (event.context.nothingDone) return answer
  const outcome: unknown = event.context.outcome ?? answer
  const thingId = deed.isOwn ? null : (named ?? idIn(outcome))
  try {
    await record(app, caller, {
      deed: withStandIn(deed, outcome),
      thingId,
      known,
      tokenId: caller.tokenId,
      address: addressOf(event),
    })
  } catch (error) {
    // It is done, and saying otherwise would have it done twice.
    console.error(`audit trail: ${error instanceof Error ? error.message : String(error)}`)
  }
  return answer
}
