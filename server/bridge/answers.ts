import type { OutboundAnswer } from './outbound'
import { OutboundRefused } from './outbound'

/** Minutes from each try to the next; given up at the try after the last, after some 22 hours. */
const WAITS = [1, 5, 15, 60, 180, 360, 720] as const
export const MOST_TRIES = WAITS.length + 1
const MINUTE_MS = 60_000
/** A bridge that asks to be left alone for longer is asked again after this. */
const LONGEST_RETRY_AFTER_MS = 12 * 60 * MINUTE_MS
/** Refusals that may be over the next time: too slow, too early, too many. */
const PASSING = [408, 425, 429]
const MOST_REASON = 500

/** What follows from a try. */
export type TryOutcome =
  | { state: 'taken'; reason: null }
  | { state: 'waiting'; nextAttemptAt: Date; reason: string }
  | { state: 'given up'; reason: string }

const isSuccess = (status: number): boolean => status >= 200 && status < 300
const isRedirect = (status: number): boolean => status >= 300 && status < 400
const isPassing = (status: number): boolean => status >= 500 || status < 200 || PASSING.includes(status)

/** Why an answer is no yes; null where it is one. */
export function refusedReason({ status, location }: Pick<OutboundAnswer, 'status' | 'location'>): string | null {
  if (isSuccess(status)) return null
  if (isRedirect(status) && location)
    return `it answered ${status}, a redirect to ${location.slice(0, 200)}; redirects are not followed, so give that address`
  return `it answered ${status}`
}

/** How long a bridge asks to be left alone, in seconds or until a moment; 0 where it asks for nothing sensible. */
function retryAfterMs(text: string | null, now: Date): number {
  if (text === null) return 0
  const wait = /^\d+$/.test(text.trim()) ? Number(text) * 1000 : Date.parse(text) - now.getTime()
  return Number.isNaN(wait) ? 0 : Math.min(Math.max(0, wait), LONGEST_RETRY_AFTER_MS)
}

/**
 * What follows from a try.
 * @param attempt from 1, since the call was last sent anew
 */
export function outcomeOf(answer: OutboundAnswer | Error, attempt: number, now: Date): TryOutcome {
  const isError = answer instanceof Error
  const reason = isError ? answer.message.slice(0, MOST_REASON) : refusedReason(answer)
  if (reason === null) return { state: 'taken', reason }
  const isFinal = isError ? answer instanceof OutboundRefused : !isPassing(answer.status)
  if (isFinal || attempt >= MOST_TRIES) return { state: 'given up', reason }
  const asked = isError ? 0 : retryAfterMs(answer.retryAfter, now)
  const wait = Math.max(WAITS[attempt - 1]! * MINUTE_MS, asked)
  return { state: 'waiting', nextAttemptAt: new Date(now.getTime() + wait), reason }
}
