import { UseOrder } from './use-order'

const MINUTE_MS = 60_000

/** What a request met. */
export interface Taken {
  allowed: boolean
  /** Requests that are left at this moment. */
  remaining: number
  /** Until all of the quota is there again, seconds. */
  resetSeconds: number
  /** Until the next request is let through, seconds; 0 where one is at once. */
  retrySeconds: number
}

interface Bucket {
  /** Requests that were taken and have not flowed in again. */
  taken: number
  /** When that was so, ms. */
  at: number
}

/** Sums of fractions fall short of the whole by less than this. */
const HAIR = 1e-6

/**
 * Token buckets, one a key: each holds a minute's quota and fills evenly, so that within any stretch of time no more than
 * the quota and what flowed in meanwhile gets through. Full ones are forgotten.
 */
export class Buckets {
  private readonly buckets = new UseOrder<Bucket>()

  /**
   * @param perMinute quota, at least 1
   * @param mostKeys buckets that are kept; beyond, those that were not used for longest are forgotten
   */
  constructor(
    readonly perMinute: number,
    private readonly mostKeys: number,
  ) {}

  /** Takes one request out of the bucket of the key, if there is one. @param now ms */
  take(key: string, now: number): Taken {
    const before = this.takenAt(key, now)
    const allowed = before + 1 <= this.perMinute + HAIR
    const taken = allowed ? before + 1 : before
    this.keep(key, { taken, at: now })
    const room = this.perMinute - taken
    return {
      allowed,
      remaining: Math.floor(room + HAIR),
      resetSeconds: this.secondsFor(taken),
      retrySeconds: this.secondsFor(1 - room),
    }
  }

  /** Until so many requests have flowed in. */
  private secondsFor(requests: number): number {
    return requests <= HAIR ? 0 : Math.ceil(((requests - HAIR) * MINUTE_MS) / this.perMinute / 1000)
  }

  private takenAt(key: string, now: number): number {
    const { taken, at } = this.buckets.get(key) ?? { taken: 0, at: now }
    return Math.max(0, taken - (Math.max(0, now - at) * this.perMinute) / MINUTE_MS)
  }

  private keep(key: string, bucket: Bucket): void {
    this.buckets.set(key, bucket)
    for (;;) {
      const oldest = this.buckets.oldest()
      if (oldest === undefined) return
      if (this.takenAt(oldest, bucket.at) > 0 && this.buckets.size <= this.mostKeys) return
      this.buckets.delete(oldest)
    }
  }
}
