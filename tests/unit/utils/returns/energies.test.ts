import { describe, expect, it } from 'vitest'
import { energyChart } from '../../../../utils/returns/energies'

const base = { best: 0, bestCount: 1, mean: 1, median: 1, start: 10, width: 2 }
const own = { title: 'Samples 2', returnId: 'a', reads: 4, counts: [1, 3] }

describe('energyChart', () => {
  it('puts counts in the middle of their steps', () => {
    const { series, unit } = energyChart({ ...base, series: [own] })
    expect(unit).toBe('reads in each step')
    expect(series[0]!.points).toEqual([
      { x: 11, y: 1 },
      { x: 13, y: 3 },
    ])
  })

  it('turns to shares when the two hold different numbers of reads', () => {
    const other = { title: 'Rehearsal 1', returnId: 'b', reads: 200, counts: [50, 150] }
    const { series, axis } = energyChart({ ...base, series: [own, other] })
    expect(axis).toBe('% of reads')
    expect(series.map(({ points }) => points.map(({ y }) => y))).toEqual([
      [25, 75],
      [25, 75],
    ])
  })
})
