import { digestOf, RateLimiter } from '../../server/rate-limit/limiter'
import { rateSettingsOf } from '../../server/rate-limit/settings'

const COUNTS = 200_000
/** As many as are remembered at most. */
const MANY = 100_000
/** Between requests of a caller that asks as often as may be for as long as one likes, ms. */
const STEADY = 50
/** So little that no bucket of many is full again, and forgotten, when its turn comes, ms. */
const AT_ONCE = 1e-4

export interface CountingRow {
  readonly name: string
  /** Nanoseconds each. */
  readonly least: number
  readonly median: number
}

/** Processor time of one of many calls, ns. */
function nanosecondsOf(call: (k: number) => void): number {
  const before = process.cpuUsage()
  for (let k = 0; k < COUNTS; k++) call(k)
  const { user, system } = process.cpuUsage(before)
  return ((user + system) * 1000) / COUNTS
}

const rowOf = (name: string, times: number[]): CountingRow => {
  times.sort((a, b) => a - b)
  return { name, least: times[0]!, median: times[times.length >> 1]! }
}

function limiterOf(digests: readonly string[]): RateLimiter {
  const limiter = new RateLimiter(rateSettingsOf({}))
  for (const digest of digests) limiter.accept(digest)
  return limiter
}

/** What counting a request costs by itself, for callers that come with a cookie as long as the one given. */
export function measureCounting(cookieLength: number, rounds: number): CountingRow[] {
  const cookies = Array.from({ length: MANY }, (_, k) => `${k}`.padStart(cookieLength, 'x'))
  const digests = cookies.map(digestOf)
  const [one, many] = [limiterOf(digests.slice(0, 1)), limiterOf(digests)]
  const addresses = digests.map((_, k) => `2001:db8:${(k >> 16).toString(16)}:${(k & 0xffff).toString(16)}::1`)
  const calls: [string, (k: number) => void][] = [
    ['digest of a cookie', (k) => void digestOf(cookies[k % MANY]!)],
    ['counted, one caller', (k) => void one.count(digests[0], '', k * STEADY)],
    [`counted, ${MANY} callers in turn`, (k) => void many.count(digests[k % MANY], '', k * AT_ONCE)],
    [`counted, ${MANY} IPv6 networks in turn`, (k) => void many.count(undefined, addresses[k % MANY]!, k * AT_ONCE)],
    ['found to be good', (k) => many.accept(digests[k % MANY]!)],
  ]
  return calls.map(([name, call]) => {
    nanosecondsOf(call)
    return rowOf(
      name,
      Array.from({ length: rounds }, () => nanosecondsOf(call)),
    )
  })
}
