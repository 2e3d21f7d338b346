import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { connectedComponents } from '../../../../shared/engine/problem/components'
import { createRandom } from '../../../../shared/engine/random'

/** Repeatedly gives both ends of each edge the lower number, until nothing changes. */
function lowestReachable(order: number, ends: readonly number[]): number[] {
  const lowest = Array.from({ length: order }, (_, v) => v)
  for (let changed = true; changed;) {
    changed = false
    for (let k = 0; k < ends.length; k += 2) {
      const low = Math.min(lowest[ends[k]!]!, lowest[ends[k + 1]!]!)
      for (const v of [ends[k]!, ends[k + 1]!]) {
        changed ||= lowest[v] !== low
        lowest[v] = low
      }
    }
  }
  return lowest
}

describe('connectedComponents', () => {
  it('numbers components by their lowest vertex', () => {
    const { count, componentOf, isolated } = connectedComponents(graphFromEdges(6, [4, 1, 5, 3]))
    expect([...componentOf]).toEqual([0, 1, 2, 3, 1, 3])
    expect(count).toBe(4)
    expect(isolated).toBe(2)
  })

  it('equals label spreading on random graphs', () => {
    const random = createRandom(9)
    for (let trial = 0; trial < 50; trial++) {
      const order = 2 + random.below(30)
      const ends = Array.from({ length: random.below(25) }, () => {
        const a = random.below(order)
        return [a, (a + 1 + random.below(order - 1)) % order]
      }).flat()
      const lowest = lowestReachable(order, ends)
      const roots = [...new Set(lowest)].sort((a, b) => a - b)
      const { count, componentOf, isolated } = connectedComponents(graphFromEdges(order, ends))
      expect(count).toBe(roots.length)
      expect([...componentOf]).toEqual(lowest.map((v) => roots.indexOf(v)))
      expect(isolated).toBe(order - new Set(ends).size)
    }
  })
})
