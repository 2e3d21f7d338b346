import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { pivotLayout } from '../../../../../shared/engine/graph/layout/pivot'
import { lowestModes, spectralLayouts } from '../../../../../shared/engine/graph/layout/spectral'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, gridGraph, permutation, regularGraph, relabelled } from '../../../../fixtures/graphs'

/** Σ over edges of the squared difference: the Rayleigh quotient of a vector of length 1. */
function quotient({ ends }: Graph, vector: Float64Array): number {
  let sum = 0
  for (let k = 0; k < ends.length; k += 2) sum += (vector[ends[k]!]! - vector[ends[k + 1]!]!) ** 2
  return sum
}

const modesOf = (graph: Graph): Float64Array[] => lowestModes(graph, pivotLayout(graph, createRandom(1)))
const dot = (a: Float64Array, b: Float64Array): number => a.reduce((sum, value, v) => sum + value * b[v]!, 0)

describe('lowestModes', () => {
  // Eigenvalues of the grid's Laplacian: sums of 2 − 2·cos(πi/width) and 2 − 2·cos(πj/height).
  it.each([
    [20, 20],
    [12, 17],
    [40, 25],
  ])('finds the lowest eigenvalues of the %i × %i grid', (width, height) => {
    const graph = relabelled(gridGraph(width, height), permutation(width * height, createRandom(2)))
    const wave = (k: number, size: number): number => 2 - 2 * Math.cos((Math.PI * k) / size)
    const exact = [0, 1, 2, 3].flatMap((i) => [0, 1, 2, 3].map((j) => wave(i, width) + wave(j, height)))
    exact.sort((a, b) => a - b)
    const modes = modesOf(graph)
    expect(quotient(graph, modes[0]!)).toBeCloseTo(exact[1]!, 7)
    expect(quotient(graph, modes[1]!)).toBeCloseTo(exact[2]!, 7)
  })

  it('gives vectors of length 1, orthogonal to each other and to the constant one', () => {
    const modes = modesOf(regularGraph(50, 3, createRandom(3)))
    const constant = new Float64Array(50).fill(1)
    modes.forEach((mode, i) => {
      expect(dot(mode, constant)).toBeCloseTo(0, 9)
      modes.forEach((other, j) => expect(dot(mode, other)).toBeCloseTo(i === j ? 1 : 0, 9))
    })
  })

  it('takes graphs whose drawing is a line, and whose eigenvalues are all equal', () => {
    for (const graph of [gridGraph(50, 1), completeGraph(8), graphFromEdges(7, [0, 1, 0, 2, 0, 3, 0, 4, 0, 5, 0, 6])])
      expect(modesOf(graph).every((mode) => mode.every(Number.isFinite))).toBe(true)
  })

  it('leaves graphs of fewer than six vertices alone', () => {
    expect(modesOf(completeGraph(5))).toEqual([])
    expect(spectralLayouts(completeGraph(5), pivotLayout(completeGraph(5), createRandom(1)))).toEqual([])
  })
})
