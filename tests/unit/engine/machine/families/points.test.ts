import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'

/** Edges between all points whose distance, in the given norm, is 1. */
function edgesByDistance(width: number, height: number, norm: (dx: number, dy: number) => number): number[] {
  const ends: number[] = []
  for (let a = 0; a < width * height; a++)
    for (let b = a + 1; b < width * height; b++) {
      const dx = Math.abs((a % width) - (b % width))
      const dy = Math.abs(Math.floor(a / width) - Math.floor(b / width))
      if (norm(dx, dy) === 1) ends.push(a, b)
    }
  return ends
}

const SIZES = [
  [1, 1],
  [1, 6],
  [6, 1],
  [2, 2],
  [5, 3],
  [4, 7],
] as const

describe('lattices of points', () => {
  it.each(SIZES)("king's graph %i×%i joins cells at Chebyshev distance 1", (width, height) => {
    const { graph } = buildFabric({ kind: 'king', width, height })
    expect([...graph.ends]).toEqual(edgesByDistance(width, height, Math.max))
  })

  it.each(SIZES)('square grid %i×%i joins points at Manhattan distance 1', (width, height) => {
    const { graph } = buildFabric({ kind: 'square', width, height })
    expect([...graph.ends]).toEqual(edgesByDistance(width, height, (dx, dy) => dx + dy))
  })

  it('numbers the points row by row and draws them one apart', () => {
    const { ids, segments } = buildFabric({ kind: 'king', width: 3, height: 2 })
    expect([...ids]).toEqual([0, 1, 2, 3, 4, 5])
    expect([...segments.subarray(16, 24)]).toEqual([1, 1, 1, 1, 2, 1, 2, 1])
  })
})
