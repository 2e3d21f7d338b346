import { describe, expect, it } from 'vitest'
import { IndexedHeap } from '../../../../shared/engine/embedding/heap'
import { createRandom } from '../../../../shared/engine/random'

describe('IndexedHeap', () => {
  it('pops the least key, as a scan over all waiting items does, under insertions and lowered keys', () => {
    const random = createRandom(7)
    const keys = new Float64Array(60)
    const heap = new IndexedHeap(keys)
    const waiting = new Set<number>()
    for (let step = 0; step < 5000; step++) {
      const item = random.below(60)
      if (random.float() < 0.6) {
        const key = random.below(40)
        if (waiting.has(item) && key >= keys[item]!) continue
        keys[item] = key
        waiting.add(item)
        heap.raise(item)
      } else if (waiting.size > 0) {
        const least = Math.min(...[...waiting].map((i) => keys[i]!))
        const popped = heap.pop()
        expect(keys[popped]).toBe(least)
        expect(waiting.delete(popped)).toBe(true)
      }
      expect(heap.size).toBe(waiting.size)
    }
  })

  it('forgets its items on clear', () => {
    const keys = Float64Array.of(3, 1, 2)
    const heap = new IndexedHeap(keys)
    for (const item of [0, 1, 2]) heap.raise(item)
    heap.clear()
    expect(heap.size).toBe(0)
    heap.raise(2)
    heap.raise(0)
    expect([heap.pop(), heap.pop(), heap.size]).toEqual([2, 0, 0])
  })
})
