import { createHash } from 'node:crypto'
import { isIPv6 } from 'node:net'
import type { Taken } from './buckets'
import { Buckets } from './buckets'
import type { RateSettings } from './settings'
import { UseOrder } from './use-order'

/** Some tens of megabytes at most. */
const MOST_KEYS = 100_000

/** SHA-256 of a token or a session’s cookie. */
export const digestOf = (credential: string): string => createHash('sha256').update(credential).digest('base64')

/** What a request was counted as. */
export interface Counted extends Taken {
  policy: 'caller' | 'address'
  perMinute: number
}

/** A household or office has an IPv6 network of 64 bits at least: every address in it counts as one. */
export function networkOf(address: string): string {
  if (!isIPv6(address)) return address
  const [head = '', tail] = address.toLowerCase().split('%')[0]!.split('::')
  const start = head ? head.split(':') : []
  const end = tail ? tail.split(':') : []
  const missing = tail === undefined ? 0 : 8 - start.length - end.length
  const groups = [...start, ...Array<string>(Math.max(0, missing)).fill('0'), ...end]
  return `${groups
    .slice(0, 4)
    .map((group) => group.replace(/^0+(?=.)/, ''))
    .join(':')}::/64`
}

/**
 * Counts requests in the memory of this process, before anything is looked up: by session or token once that was found to be
 * good, else by network address. So whoever tries many tokens is counted by address, and people behind one address do not
 * take each other's quota.
 */
export class RateLimiter {
  private readonly callers: Buckets | null
  private readonly addresses: Buckets | null
  /** Digests of what was found to be good; those used last are kept. */
  private readonly good = new UseOrder<object>()

  constructor({ caller, address }: RateSettings) {
    this.callers = caller === null ? null : new Buckets(caller, MOST_KEYS)
    this.addresses = address === null ? null : new Buckets(address, MOST_KEYS)
  }

  /** @param digest of what the request came with @returns null where this is not limited */
  count(digest: string | undefined, address: string, now: number): Counted | null {
    const isGood = digest !== undefined && this.good.get(digest) !== undefined
    const buckets = isGood ? this.callers : this.addresses
    if (!buckets) return null
    const key = isGood ? digest : networkOf(address)
    return { ...buckets.take(key, now), policy: isGood ? 'caller' : 'address', perMinute: buckets.perMinute }
  }

  /** What somebody came with opened a session, or is a token that holds. */
  accept(digest: string): void {
    this.good.set(digest, {})
    if (this.good.size > MOST_KEYS) this.good.delete(this.good.oldest()!)
  }
}
