import type { H3Event } from 'h3'
import { getCookie, getHeader, setResponseHeader, setResponseHeaders } from 'h3'
import { TooManyError } from '../../shared/errors'
import { groupDigits } from '../../shared/engine/digits'
import type { Counted } from '../rate-limit/limiter'
import { digestOf } from '../rate-limit/limiter'
import { toHttpError } from '../utils/http'
import { useRateLimiter } from '../utils/rates'
import { addressOf } from '../utils/session'

/** Asked for every few seconds by whatever watches the installation. */
const NOT_COUNTED = ['/api/health']

/** What a page asks for while it is rendered comes from this process itself: the page was asked for, and not by many. */
const isFromOutside = ({ node }: H3Event): boolean => Boolean(node.req.socket.remoteAddress)

/** Fields as in draft-ietf-httpapi-ratelimit-headers: quota `q` for a window of `w` seconds; `r` left, full again in `t`. */
function tell(event: H3Event, { policy, perMinute, remaining, resetSeconds }: Counted): void {
  setResponseHeaders(event, {
    'ratelimit-policy': `"${policy}";q=${perMinute};w=60`,
    ratelimit: `"${policy}";r=${remaining};t=${resetSeconds}`,
  })
}

/** Counts requests to the API, and refuses those beyond the limit before anything is looked up for them. */
export default defineEventHandler((event) => {
  const path = event.path.split('?')[0]!
  if (!path.startsWith('/api/') || NOT_COUNTED.includes(path) || !isFromOutside(event)) return
  const credential = getHeader(event, 'authorization') ?? getCookie(event, useRuntimeConfig(event).session.name!)
  event.context.callerDigest = credential === undefined ? undefined : digestOf(credential)
  const counted = useRateLimiter().count(event.context.callerDigest, addressOf(event), Date.now())
  if (!counted) return
  tell(event, counted)
  if (counted.allowed) return
  setResponseHeader(event, 'retry-after', counted.retrySeconds)
  throw toHttpError(
    new TooManyError(
      'requests.many',
      `More than ${groupDigits(counted.perMinute)} requests a minute. Wait ${counted.retrySeconds} s and try again.`,
      counted.retrySeconds,
    ),
  )
})
