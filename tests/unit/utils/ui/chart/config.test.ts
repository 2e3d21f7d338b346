import { describe, expect, it } from 'vitest'
import { palettes } from '../../../../../assets/css/tokens'
import { inLines } from '../../../../../utils/ui/chart/axes'
import { chartConfig } from '../../../../../utils/ui/chart/config'
import { legendOf } from '../../../../../utils/ui/chart/legend'
import type { ChartInput } from '../../../../../utils/ui/chart/types'

const points = [1, 2, 3].map((x) => ({ x, y: 10 * x }))
const input: ChartInput = {
  kind: 'bar',
  title: 'Energies',
  x: { label: 'energy' },
  y: { label: 'reads' },
  series: [
    { name: 'repaired', points },
    { name: 'majority', kind: 'step', points },
    { name: 'unbroken', kind: 'line', stroke: 'dashed', marker: 'hollow', points },
  ],
}

describe('chartConfig', () => {
  it.each(Object.entries(palettes))('draws in the colours of the theme %s alone', (_, palette) => {
    const text = JSON.stringify(chartConfig(() => ({ input, palette })))
    const used = new Set(text.match(/#[0-9A-F]{6}\b/gi))
    expect(used.size).toBeGreaterThan(3)
    for (const colour of used) expect(Object.values(palette)).toContain(colour)
  })

  it('leaves room for half a bar, or half a step between points, at the ends of x', () => {
    const ends = (chart: ChartInput) => {
      const { min, max } = chartConfig(() => ({ input: chart, palette: palettes.light })).options!.scales!.x!
      return [min, max]
    }
    expect(ends(input)).toEqual([0.5, 3.5])
    expect(ends({ ...input, binWidth: 0.5 })).toEqual([0.75, 3.25])
    expect(ends({ ...input, kind: 'points', series: [{ name: 'gauge', points }] })).toEqual([0.5, 3.5])
    expect(ends({ ...input, kind: 'line', series: [{ name: 'a', points }] })).toEqual([undefined, undefined])
  })

  it('moves nothing', () => {
    expect(chartConfig(() => ({ input, palette: palettes.light })).options!.animation).toBe(false)
  })
})

describe('legendOf', () => {
  it('tells series apart by mark and stroke before colour', () => {
    const looks = legendOf(input).map(({ isBar, isLine, marker, dash }) =>
      JSON.stringify([isBar, isLine, marker, dash]),
    )
    expect(new Set(looks).size).toBe(3)
  })

  it('has nothing to say of a single series', () => {
    expect(legendOf({ ...input, series: input.series.slice(0, 1) })).toEqual([])
  })
})

describe('inLines', () => {
  it('breaks between words where they do not fit, never within one', () => {
    expect(inLines('logical energy, offset included', 400)).toEqual(['logical energy, offset included'])
    expect(inLines('logical energy, offset included', 110)).toEqual(['logical energy,', 'offset included'])
    expect(inLines('included', 10)).toEqual(['included'])
  })
})
