import { describe, expect, it } from 'vitest'
import type { ComparedReturn } from '../../../../shared/schemas/return-comparison'
import { comparisonChart } from '../../../../utils/returns/comparison'

const needed = (value: number | null) => ({ value, low: value && value / 2, high: value && 2 * value })
const rate = (count: number) => ({ count, total: 10, rate: count / 10, low: 0, high: 1 })

/** Samples of a run sheet at one strength; what is not said is as usual. */
const samples = (number: number, k: number | null, change: Partial<ComparedReturn> = {}): ComparedReturn => ({
  id: `r${number}`,
  number,
  source: 'upload',
  createdAt: `2026-11-0${number}T00:00:00.000Z`,
  runSheet: { id: 's', number: 4, name: 'Run' },
  version: 1,
  embedding: { id: 'e', number: 1 },
  machine: { id: 'alder', name: 'Alder', calibration: 2 },
  annealMicroseconds: 20,
  gauges: 1,
  reads: 10,
  strength: k === null ? null : { min: k, mean: k, max: k },
  scale: 1,
  readsWithBreak: rate(3),
  chainReads: rate(2),
  best: -7,
  mean: -5,
  gapOfBest: 1,
  success: rate(1),
  r99: needed(44),
  milliseconds: needed(90),
  millisecondsPerRead: 2,
  isTimeMeasured: true,
  temperature: { temperature: 0.5, inverseTemperature: 2, standardError: 0.1, rows: 10, rowsInAll: 10 },
  ...change,
})
const JUNIPER = { id: 'juniper', name: 'Juniper', calibration: 1 }

describe('comparisonChart', () => {
  it('has a series for each machine and source, by strength', () => {
    const items = [
      samples(1, 3),
      samples(2, 1),
      samples(3, 2, { source: 'rehearsal' }),
      samples(4, 2, { machine: JUNIPER }),
    ]
    const { series, x } = comparisonChart(items, 'breaks', 'strength')
    expect(x.unit).toBe('in units of J')
    expect(series.map(({ name, marker }) => [name, marker])).toEqual([
      ['Alder, returned', 'full'],
      ['Alder, rehearsed', 'hollow'],
      ['Juniper, returned', 'plus'],
    ])
    expect(series[0]!.points).toEqual([
      { x: 1, y: 20, low: 0, high: 100 },
      { x: 3, y: 20, low: 0, high: 100 },
    ])
    expect(series[0]!.tone).not.toBe(series[2]!.tone)
  })

  it('puts samples in the order in which they came, by their number', () => {
    const { series, x } = comparisonChart([samples(2, 1), samples(1, null)], 'success', 'order')
    expect(x.categories).toEqual(['RS-4/1', 'RS-4/2'])
    expect(series[0]!.points.map(({ x: place }) => place)).toEqual([0, 1])
  })

  it('says what it leaves out', () => {
    const none = samples(1, 2, { milliseconds: needed(null) })
    expect(comparisonChart([none, samples(2, 1)], 'time', 'strength').leftOut).toBe(
      '1 set of samples without this value.',
    )
    expect(comparisonChart([samples(1, null), samples(2, null)], 'gap', 'strength')).toMatchObject({
      series: [],
      leftOut: '2 sets of samples without this value.',
    })
  })

  it('carries the error of the inverse temperature over to the temperature', () => {
    const [point] = comparisonChart([samples(1, 1)], 'temperature', 'strength').series[0]!.points
    expect(point!.y).toBe(0.5)
    expect(point!.high! - point!.y).toBeCloseTo((1.96 * 0.1) / 4, 5)
    const cold = { temperature: 0, inverseTemperature: null, standardError: null, rows: 1, rowsInAll: 1 }
    expect(
      comparisonChart([samples(1, 1, { temperature: cold })], 'temperature', 'strength').series[0]!.points,
    ).toEqual([{ x: 1, y: 0 }])
  })
})
