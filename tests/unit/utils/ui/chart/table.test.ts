import { describe, expect, it } from 'vitest'
import { chartCsv, chartSummary, chartTable } from '../../../../../utils/ui/chart/table'
import type { ChartInput } from '../../../../../utils/ui/chart/types'

const scan: ChartInput = {
  kind: 'line',
  title: 'Breaks against strength',
  x: { label: 'k' },
  y: { label: 'reads, %' },
  series: [
    {
      name: 'any',
      points: [
        { x: 12, y: 66, low: 63, high: 69 },
        { x: 8, y: 100, low: 99.6, high: 100 },
      ],
    },
    {
      name: 'chains',
      points: [
        { x: 8, y: 14.1 },
        { x: 20, y: 0.1 },
      ],
    },
  ],
}

describe('chartTable', () => {
  it('has a row for every x of any series, in rising order, with intervals where there are some', () => {
    const table = chartTable(scan)
    expect(table.headings).toEqual(['k', 'any: reads, %', 'interval', 'chains: reads, %'])
    expect(table.rows).toEqual([
      ['8', '100', '99.6–100.0', '14.1'],
      ['12', '66', '63–69', '–'],
      ['20', '–', '–', '0.1'],
    ])
  })

  it('keeps the order and the names of rates', () => {
    const table = chartTable({
      kind: 'rates',
      title: 'By chain',
      x: { label: 'reads broken, %' },
      y: { label: 'chain' },
      series: [
        {
          name: 'breaks',
          points: [
            { x: 0, y: 63, label: 'whi.4' },
            { x: 1, y: 31, label: 'kno.4' },
          ],
        },
      ],
    })
    expect(table.headings).toEqual(['chain', 'reads broken, %'])
    expect(table.rows.map((row) => row[0])).toEqual(['whi.4', 'kno.4'])
  })

  it('uses the names of categories', () => {
    const table = chartTable({
      ...scan,
      x: { label: 'rule', categories: ['fixed', 'cut'] },
      series: [{ name: 'a', points: [{ x: 1, y: 2 }] }],
    })
    expect(table.rows).toEqual([['cut', '2']])
  })
})

describe('units', () => {
  it('stand in the headings, and bars that hold a stretch of values say so', () => {
    const sizes: ChartInput = {
      kind: 'bar',
      title: 'Sizes',
      x: { label: 'size of a programmed J', unit: 'programmed units' },
      y: { label: 'couplers' },
      binWidth: 0.25,
      series: [
        {
          name: 'couplers',
          points: [
            { x: 0.125, y: 3 },
            { x: 0.375, y: 1 },
          ],
        },
      ],
    }
    expect(chartCsv(sizes).split('\r\n')[0]).toBe(
      '"size of a programmed J, programmed units, middle of bars of 0.25",couplers',
    )
    expect(chartTable({ ...sizes, binWidth: 1 }).headings[0]).toBe('size of a programmed J, programmed units')
  })
})

describe('chartCsv', () => {
  it('gives plain numbers, empty fields for missing ones, and quotes where needed', () => {
    const lines = chartCsv(scan).split('\r\n')
    expect(lines[0]).toBe('k,"any: reads, %","any: reads, %, low end","any: reads, %, high end","chains: reads, %"')
    expect(lines[1]).toBe('8,100,99.6,100,14.1')
    expect(lines[3]).toBe('20,,,,0.1')
    expect(lines).toHaveLength(5)
  })

  it('hands no formula to a spreadsheet', () => {
    const csv = chartCsv({
      ...scan,
      kind: 'rates',
      series: [{ name: 'a', points: [{ x: 0, y: -1, label: '=1+1' }] }],
    })
    expect(csv.split('\r\n')[1]).toBe("'=1+1,-1")
  })
})

describe('chartSummary', () => {
  it('says range and count, or that there is nothing', () => {
    expect(chartSummary(scan)).toContain('reads, %: 0.1–100.0, 4 values. Series: any, chains.')
    expect(chartSummary({ ...scan, series: [] })).toBe('Breaks against strength: no data.')
  })
})
