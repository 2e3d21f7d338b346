import { expect, test } from 'vitest'
import { Trace } from '../../../../../server/jobs/search/trace'

const point = (seconds: number) => ({ seconds, overlap: 3, longestChain: null, qubitsUsed: null })

test('keeps every point of a short search', () => {
  const trace = new Trace()
  const points = [0, 0.5, 1, 1.5].map(point)
  points.forEach((each) => trace.add(each))
  expect(trace.all()).toEqual(points)
})

test('thins a long search evenly to at most 120 points, with the first and the newest', () => {
  const trace = new Trace()
  for (let k = 0; k <= 36_000; k++) {
    trace.add(point(k / 10))
    if (k % 7 === 0) expect(trace.all().length).toBeLessThanOrEqual(120)
  }
  const seconds = trace.all().map((each) => each.seconds)
  expect(seconds.length).toBeGreaterThan(50)
  expect([seconds[0], seconds.at(-1)]).toEqual([0, 3600])
  const gaps = seconds.slice(1, -1).map((each, k) => each - seconds[k]!)
  expect(Math.max(...gaps) / Math.min(...gaps)).toBeLessThan(2)
})
