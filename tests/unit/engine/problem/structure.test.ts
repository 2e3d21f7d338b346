import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../shared/engine/problem/build'
import { structureOf } from '../../../../shared/engine/problem/structure'
import { createRandom } from '../../../../shared/engine/random'
import { randomProblem, real } from '../../../fixtures/problems/random-problem'

describe('structureOf', () => {
  it('reports a small problem worked out by hand', () => {
    // A triangle 0-1-2 with a tail 2-3, an edge 4-5, and 6 alone.
    const problem = buildProblem(
      7,
      {
        rows: [0, 6, 0, 0, 1, 2, 4],
        cols: [0, 6, 1, 2, 2, 3, 5],
        values: [-8, 0, 1, 1, 2, 0.5, 2],
      },
      9,
    ).problem
    expect(structureOf(problem)).toEqual({
      variables: 7,
      interactions: 5,
      density: 5 / 21,
      degree: { min: 0, mean: 10 / 7, max: 3 },
      degreeHistogram: [
        { value: 0, count: 1 },
        { value: 1, count: 3 },
        { value: 2, count: 2 },
        { value: 3, count: 1 },
      ],
      linearHistogram: [{ from: -8, to: -8, count: 1 }],
      interactionHistogram: [
        { from: 0.5, to: 0.5, count: 1 },
        { from: 1, to: 1, count: 2 },
        { from: 2, to: 2, count: 2 },
      ],
      coefficientSizes: { least: 0.5, greatest: 8 },
      dynamicRange: 16,
      components: 3,
      isolated: 1,
      treewidthUpperBound: 2,
    })
  })

  it('keeps to 24 bins that hold every coefficient', () => {
    const problem = randomProblem(createRandom(3), 40, 0.5, real)
    const report = structureOf(problem)
    const total = (bins: readonly { count: number }[]): number => bins.reduce((sum, bin) => sum + bin.count, 0)
    expect(report.interactionHistogram).toHaveLength(24)
    expect(total(report.interactionHistogram)).toBe(problem.values.length)
    expect(report.linearHistogram).toHaveLength(24)
    expect(total(report.linearHistogram)).toBe(40)
    expect(total(report.degreeHistogram)).toBe(40)
  })

  it('has no dynamic range without coefficients and survives the smallest problems', () => {
    const empty = structureOf(buildProblem(0, { rows: [], cols: [], values: [] }, 0).problem)
    expect(empty).toMatchObject({ dynamicRange: null, density: 0, components: 0, degree: { min: 0, mean: 0, max: 0 } })
    const single = structureOf(buildProblem(1, { rows: [], cols: [], values: [] }, 4).problem)
    expect(single).toMatchObject({ dynamicRange: null, density: 0, components: 1, isolated: 1, treewidthUpperBound: 0 })
  })
})
