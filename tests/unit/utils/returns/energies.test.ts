import { describe, expect, it } from 'vitest'
import { cumulativeSeries, energyChart } from '../../../../utils/returns/energies'

const base = { best: 0, bestCount: 1, mean: 1, median: 1, start: 10, width: 2 }
const cumulative = [
  { energy: 10, reads: 1 },
  { energy: 12, reads: 4 },
]
const own = { title: 'Samples 2', returnId: 'a', reads: 4, counts: [1, 3], cumulative }

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
    const other = { title: 'Rehearsal 1', returnId: 'b', reads: 200, counts: [50, 150], cumulative: [] }
    const { series, axis } = energyChart({ ...base, series: [own, other] })
    expect(axis).toBe('% of reads')
    expect(series.map(({ points }) => points.map(({ y }) => y))).toEqual([
      [25, 75],
      [25, 75],
    ])
  })
})

describe('cumulativeSeries', () => {
  it('rises with the energy where less is better', () => {
    const [series] = cumulativeSeries({ series: [own] }, 'min')
    expect(series).toMatchObject({ kind: 'step', holds: 'from' })
    expect(series!.points).toEqual([
      { x: 10, y: 25 },
      { x: 12, y: 100 },
    ])
  })

  it('falls with the value where more is better', () => {
    const best = [
      { energy: 12, reads: 1 },
      { energy: 10, reads: 4 },
    ]
    const [series] = cumulativeSeries({ series: [{ ...own, cumulative: best }] }, 'max')
    expect(series!.holds).toBe('up to')
    expect(series!.points).toEqual([
      { x: 10, y: 100 },
      { x: 12, y: 25 },
    ])
  })
})
