import { describe, expect, it } from 'vitest'
import { sizeChart } from '../../../../utils/run-sheet/sizes'

const single = (value: number, count: number) => ({ from: value, to: value, count })

describe('sizeChart', () => {
  it('puts single values into equal bars with the threshold on an edge', () => {
    const { points, width, end } = sizeChart([single(0.02, 4), single(0.03, 5), single(1, 7)], 0.03)
    expect(width).toBe(0.03)
    expect(points.reduce((sum, { y }) => sum + y, 0)).toBe(16)
    expect(points[0]).toEqual({ x: 0.015, y: 4, tone: 'ochre' })
    expect(points[1]).toMatchObject({ y: 5 })
    expect(points[1]!.tone).toBeUndefined()
    expect(end).toBeGreaterThan(1)
  })

  it('keeps bars of equal width and sets apart only those wholly under the threshold', () => {
    const bins = [
      { from: 0, to: 1, count: 2 },
      { from: 1, to: 2, count: 3 },
    ]
    const { points, width } = sizeChart(bins, 1.5)
    expect(width).toBe(1)
    expect(points.map(({ x, y, tone }) => [x, y, tone])).toEqual([
      [0.5, 2, 'ochre'],
      [1.5, 3, undefined],
    ])
  })

  it('has nothing to draw without values', () => {
    expect(sizeChart([], 0.03).points).toEqual([])
  })
})
