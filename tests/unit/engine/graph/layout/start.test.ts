import { describe, expect, it } from 'vitest'
import { sizeOf } from '../../../../../shared/engine/graph/graph'
import { placementStart } from '../../../../../shared/engine/graph/layout/start'
import { wirelength } from '../../../../../shared/engine/graph/layout/sites'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, kingGraph, permutation, regularGraph, relabelled } from '../../../../fixtures/graphs'

describe('placementStart', () => {
  it.each([
    [6, 6],
    [10, 10],
    [29, 29],
    [30, 30],
    [18, 24],
    [71, 71],
  ])('recovers the %i × %i grid from shuffled vertices', (width, height) => {
    for (const seed of [1, 2, 3]) {
      const graph = relabelled(gridGraph(width, height), permutation(width * height, createRandom(seed)))
      const { length, sites } = placementStart(graph, width, height, createRandom(seed, 1))
      expect(length).toBe(sizeOf(graph))
      expect(wirelength(graph, sites)).toBe(length)
    }
  })

  it('comes near on a king’s graph, and beats strewing by far on a random regular graph', () => {
    const king = relabelled(kingGraph(20, 20), permutation(400, createRandom(1)))
    expect(placementStart(king, 20, 20, createRandom(2)).length / sizeOf(king)).toBeLessThan(2)
    const regular = regularGraph(400, 3, createRandom(3))
    expect(placementStart(regular, 20, 20, createRandom(4)).length / sizeOf(regular)).toBeLessThan(0.4 * (40 / 3))
  })
})
