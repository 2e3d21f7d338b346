import { describe, expect, it } from 'vitest'
import { DegreeBuckets } from '../../../../shared/engine/problem/degree-buckets'
import { createRandom } from '../../../../shared/engine/random'

describe('DegreeBuckets', () => {
  it('knows the two smallest degrees through any changes and removals', () => {
    const random = createRandom(19)
    for (let round = 0; round < 50; round++) {
      const order = 2 + random.below(20)
      const degrees = Array.from({ length: order }, () => random.below(order))
      const buckets = new DegreeBuckets(Int32Array.from(degrees))
      const left = new Set(degrees.keys())
      while (left.size > 0) {
        const sorted = [...left].map((v) => degrees[v]!).sort((a, b) => a - b)
        expect(degrees[buckets.leastVertex()]).toBe(sorted[0])
        expect(buckets.secondDegree()).toBe(sorted[1] ?? 0)
        expect(buckets.count).toBe(left.size)
        const v = [...left][random.below(left.size)]!
        if (random.float() < 0.3) {
          buckets.remove(v)
          left.delete(v)
          continue
        }
        const degree = random.below(order)
        buckets.change(v, degree - degrees[v]!)
        degrees[v] = degree
      }
    }
  })
})
