import { describe, expect, it } from 'vitest'
import { nextStop, placeText, stopsOf, stopText, valueText } from '../../../../../utils/ui/chart/points'
import type { ChartInput } from '../../../../../utils/ui/chart/types'

const scan: ChartInput = {
  kind: 'line',
  title: 'Breaks against strength',
  x: { label: 'chain strength k', unit: 'in units of J' },
  y: { label: 'reads', unit: '%' },
  series: [
    {
      name: 'any break',
      points: [
        { x: 12, y: 66, low: 63, high: 69 },
        { x: 8, y: 100 },
      ],
    },
    { name: 'chain reads', points: [{ x: 12, y: 2.2 }] },
  ],
}
const rates: ChartInput = {
  kind: 'rates',
  title: 'By chain',
  x: { label: 'reads in which the chain broke', unit: '%' },
  y: { label: 'chain' },
  series: [
    {
      name: 'breaks',
      points: [
        { x: 0, y: 63, low: 60, high: 66, label: 'whi.4' },
        { x: 1, y: 31, label: 'kno.4' },
      ],
    },
  ],
}

describe('stops of a chart', () => {
  it('go from left to right, all series at one place together', () => {
    expect(stopsOf(scan)).toEqual([
      { x: 8, items: [{ series: 0, index: 1 }] },
      {
        x: 12,
        items: [
          { series: 0, index: 0 },
          { series: 1, index: 0 },
        ],
      },
    ])
  })

  it('keep the order of rows', () => {
    expect(stopsOf(rates).map(({ x }) => x)).toEqual([0, 1])
  })

  it('are said with names, units and intervals', () => {
    const [first, second] = stopsOf(scan)
    expect(stopText(scan, first!)).toBe('chain strength k 8 in units of J: any break 100 %')
    expect(stopText(scan, second!)).toBe(
      'chain strength k 12 in units of J: any break 66 %, interval 63–69; chain reads 2.2 %',
    )
    expect(stopText(rates, stopsOf(rates)[0]!)).toBe('whi.4: reads in which the chain broke 63 %, interval 60–66')
  })

  it('name the series only where there are several', () => {
    expect(valueText(scan, 0, scan.series[0]!.points[0]!)).toBe('any break  66  63–69')
    expect(valueText(rates, 0, rates.series[0]!.points[1]!)).toBe('31')
    expect(placeText({ ...scan, x: { label: 'rule', categories: ['fixed', 'cut'] } }, { x: 1, y: 0 })).toBe('cut')
  })
})

describe('keys on a chart', () => {
  it('step, jump and stop at the ends', () => {
    expect(nextStop('ArrowRight', -1, 5)).toBe(0)
    expect(nextStop('ArrowLeft', -1, 5)).toBe(4)
    expect(nextStop('ArrowDown', 4, 5)).toBe(4)
    expect(nextStop('ArrowUp', 0, 5)).toBe(0)
    expect(nextStop('End', 1, 5)).toBe(4)
    expect(nextStop('Home', 3, 5)).toBe(0)
    expect(nextStop('PageDown', 1, 25)).toBe(11)
  })

  it('leave other keys, and charts without points, alone', () => {
    expect(nextStop('Tab', 1, 5)).toBeNull()
    expect(nextStop('End', -1, 0)).toBeNull()
  })
})
