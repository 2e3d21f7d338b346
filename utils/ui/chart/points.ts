import { formatInterval, formatNumber } from '../../format'
import { axisName } from './axisName'
import type { ChartAxis, ChartInput, ChartPoint } from './types'

/** The places of a chart that one steps through, by pointer or by keys, and what is said of them. */

interface StopItem {
  /** Numbers of the series and of the point in it. */
  readonly series: number
  readonly index: number
}

/** One place on the x axis, or one row of a chart of rates. */
export interface ChartStop {
  readonly x: number
  readonly items: readonly StopItem[]
}

/** From left to right; the rows of rates keep their order. */
export function stopsOf({ kind, series }: Pick<ChartInput, 'kind' | 'series'>): ChartStop[] {
  const byX = new Map<number, StopItem[]>()
  for (const [number, { points }] of series.entries())
    for (const [index, { x }] of points.entries()) byX.set(x, [...(byX.get(x) ?? []), { series: number, index }])
  const stops = [...byX].map(([x, items]) => ({ x, items }))
  return kind === 'rates' ? stops : stops.sort((a, b) => a.x - b.x)
}

/** Where a point lies: `12, chain strength k`, a category, or the label of a row. */
export function placeText(input: ChartInput, point: ChartPoint): string {
  if (input.kind === 'rates') return point.label ?? String(point.x)
  return input.x.categories?.[point.x] ?? `${formatNumber(point.x)}, ${axisName(input.x)}`
}

/** The value of a point with its interval, and its series where there are several. */
export function valueText(input: ChartInput, series: number, point: ChartPoint): string {
  const interval = point.low === undefined ? '' : `  ${formatInterval(point.low, point.high)}`
  const name = input.series.length > 1 ? `${input.series[series]?.name}  ` : ''
  return `${name}${formatNumber(point.y)}${interval}`
}

/** A number with the unit of its axis: `12 in units of J`. */
const withUnit = (text: string, { unit }: ChartAxis): string => (unit ? `${text} ${unit}` : text)

function spokenPlace(input: ChartInput, point: ChartPoint): string {
  if (input.kind === 'rates' || input.x.categories) return placeText(input, point)
  return withUnit(`${input.x.label} ${formatNumber(point.x)}`, input.x)
}

/** A stop in one sentence, for those who do not see it. */
export function stopText(input: ChartInput, { items }: ChartStop): string {
  const points = items.flatMap(({ series, index }) => {
    const point = input.series[series]?.points[index]
    return point ? [{ series, point }] : []
  })
  const [first] = points
  if (!first) return ''
  const axis = input.kind === 'rates' ? input.x : input.y
  const values = points.map(({ series, point }) => {
    const name = input.series.length > 1 ? input.series[series]?.name : axis.label
    const interval = point.low === undefined ? '' : `, interval ${formatInterval(point.low, point.high)}`
    return `${name} ${withUnit(formatNumber(point.y), axis)}${interval}`
  })
  return `${spokenPlace(input, first.point)}: ${values.join('; ')}`
}

const PAGE = 10

/**
 * Where a key leads from one stop of so many: −1 is none yet.
 * @returns null for keys that do not move
 */
export function nextStop(key: string, at: number, count: number): number | null {
  const to = {
    ArrowRight: at + 1,
    ArrowDown: at + 1,
    ArrowLeft: at < 0 ? count - 1 : at - 1,
    ArrowUp: at < 0 ? count - 1 : at - 1,
    PageDown: at + PAGE,
    PageUp: at - PAGE,
    Home: 0,
    End: count - 1,
  }[key]
  return to === undefined || count === 0 ? null : Math.min(count - 1, Math.max(0, to))
}
