import { describe, expect, it } from 'vitest'
import type { StructureView } from '../../../../shared/schemas/problems'
import { structureCharts } from '../../../../utils/problem/structure'

const structure: StructureView = {
  variables: 3,
  interactions: 3,
  density: 1,
  degree: { min: 2, mean: 2, max: 2 },
  degreeHistogram: [{ value: 2, count: 3 }],
  linearHistogram: [],
  interactionHistogram: [
    { from: -1, to: 0, count: 1 },
    { from: 0, to: 1, count: 2 },
  ],
  dynamicRange: 2,
  components: 1,
  isolated: 0,
  treewidthUpperBound: 2,
}

describe('structureCharts', () => {
  it('puts bars at the middle of their bins', () => {
    const [, sizes] = structureCharts(structure, 'ising', 'min')
    expect(sizes!.binWidth).toBe(1)
    expect(sizes!.points).toEqual([
      { x: -0.5, y: 1 },
      { x: 0.5, y: 2 },
    ])
    expect(sizes!.x.label).toContain('J')
  })

  it('mirrors coefficients of a maximised problem, which are kept negated', () => {
    const [degree, sizes] = structureCharts(structure, 'qubo', 'max')
    expect(sizes!.points).toEqual([
      { x: -0.5, y: 2 },
      { x: 0.5, y: 1 },
    ])
    expect(degree!.points).toEqual([{ x: 2, y: 3 }])
  })

  it('leaves room beside a single value', () => {
    const [degree] = structureCharts(structure, 'qubo', 'min')
    expect(degree!.x.min).toBeLessThan(2)
    expect(degree!.binWidth).toBeLessThan(degree!.x.max! - degree!.x.min!)
  })
})
