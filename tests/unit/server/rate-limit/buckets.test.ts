import fc from 'fast-check'
import { expect, it } from 'vitest'
import { Buckets } from '../../../../server/rate-limit/buckets'

it('lets a minute’s quota through at once, then as many as flow in', () => {
  const buckets = new Buckets(60, 10)
  const first = Array.from({ length: 61 }, () => buckets.take('a', 0))
  expect(first.map(({ allowed }) => allowed)).toEqual([...Array<boolean>(60).fill(true), false])
  expect(first[0]).toEqual({ allowed: true, remaining: 59, resetSeconds: 1, retrySeconds: 0 })
  expect(first[60]).toEqual({ allowed: false, remaining: 0, resetSeconds: 60, retrySeconds: 1 })
  expect(buckets.take('a', 999).allowed).toBe(false)
  expect(buckets.take('a', 1000).allowed).toBe(true)
  expect(buckets.take('a', 1001).allowed).toBe(false)
  expect(buckets.take('b', 1001).allowed).toBe(true)
})

it('forgets full buckets, and beyond its size those that were not used for longest', () => {
  const buckets = new Buckets(2, 3)
  for (const key of ['a', 'a', 'b', 'c', 'd']) buckets.take(key, 0)
  expect(buckets.take('a', 1).remaining).toBe(1)
  expect(buckets.take('d', 1).remaining).toBe(0)
})

it('says how long to wait so that whoever waits gets through, and not a second more', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 5000 }), fc.integer({ min: 0, max: 50_000 }), (perMinute, later) => {
      const buckets = new Buckets(perMinute, 1)
      for (let k = 0; k < perMinute; k++) expect(buckets.take('a', 0).allowed).toBe(true)
      const { allowed, retrySeconds } = buckets.take('a', 0)
      expect(allowed).toBe(false)
      const at = Math.max(retrySeconds * 1000, later)
      expect(buckets.take('a', at).allowed).toBe(true)
      expect(retrySeconds).toBeLessThanOrEqual(Math.ceil(60 / perMinute))
    }),
    { numRuns: 50 },
  )
})

it('never lets through more than its quota and what flowed in, in any stretch of time', () => {
  const steps = fc.array(fc.integer({ min: 0, max: 4000 }), { minLength: 1, maxLength: 200 })
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 30 }), steps, (perMinute, gaps) => {
      const buckets = new Buckets(perMinute, 5)
      const passed: number[] = []
      let now = 0
      for (const gap of gaps) {
        now += gap
        if (buckets.take('a', now).allowed) passed.push(now)
      }
      for (let i = 0; i < passed.length; i++)
        for (let j = i; j < passed.length; j++) {
          const inflow = ((passed[j]! - passed[i]!) * perMinute) / 60_000
          expect(j - i + 1).toBeLessThanOrEqual(perMinute + inflow + 1e-6)
        }
    }),
  )
})
