import { csvCell } from '#shared/csv'
import { formatInterval, formatNumber } from '../../format'
import { axisName } from './axisName'
import type { ChartInput } from './types'

/** The numbers of a chart as rows: the same for the table beneath it and for the CSV. */

export interface ChartTable {
  headings: string[]
  /** Text for reading; numbers right-aligned. */
  rows: string[][]
  /** Plain values for a file. */
  values: (string | number | null)[][]
  valueHeadings: string[]
}

const hasIntervals = (input: ChartInput, index: number) =>
  input.series[index]?.points.some((point) => point.low !== undefined) ?? false

/** Rows by x in rising order; rows of a chart of rates keep their order, which means something. */
function keysOf(input: ChartInput): number[] {
  const keys = [...new Set(input.series.flatMap((series) => series.points.map((point) => point.x)))]
  return input.kind === 'rates' ? keys : keys.sort((a, b) => a - b)
}

function nameOf(input: ChartInput, x: number): string | undefined {
  if (input.kind === 'rates') return input.series[0]?.points.find((point) => point.x === x)?.label ?? String(x)
  return input.x.categories?.[x]
}

/** Bars that stand for a stretch of values are listed by its middle. */
function placeHeading({ kind, x, y, series, binWidth }: ChartInput): string {
  if (kind === 'rates') return axisName(y)
  const isStretch = kind === 'bar' && binWidth !== undefined && binWidth !== 1 && (series[0]?.points.length ?? 0) > 1
  return isStretch ? `${axisName(x)}, middle of bars of ${formatNumber(binWidth)}` : axisName(x)
}

export function chartTable(input: ChartInput): ChartTable {
  const single = input.series.length === 1
  const first = placeHeading(input)
  const valueAxis = axisName(input.kind === 'rates' ? input.x : input.y)
  const table: ChartTable = { headings: [first], valueHeadings: [first], rows: [], values: [] }
  for (const [index, series] of input.series.entries()) {
    const name = single ? valueAxis : `${series.name}: ${valueAxis}`
    table.headings.push(name)
    table.valueHeadings.push(name)
    if (hasIntervals(input, index)) {
      table.headings.push('interval')
      table.valueHeadings.push(`${name}, low end`, `${name}, high end`)
    }
  }
  const lookups = input.series.map((series) => new Map(series.points.map((point) => [point.x, point])))
  for (const x of keysOf(input)) {
    const name = nameOf(input, x)
    const row = [name ?? formatNumber(x)]
    const values: (string | number | null)[] = [name ?? x]
    for (const [index, lookup] of lookups.entries()) {
      const point = lookup.get(x)
      row.push(formatNumber(point?.y))
      values.push(point?.y ?? null)
      if (!hasIntervals(input, index)) continue
      row.push(formatInterval(point?.low, point?.high))
      values.push(point?.low ?? null, point?.high ?? null)
    }
    table.rows.push(row)
    table.values.push(values)
  }
  return table
}

/**
 * One field of a CSV file, quoted where needed (RFC 4180). Text that a spreadsheet would run as a formula is given a
 * leading apostrophe.
 */
function csvField(value: string | number | null): string {
  if (value === null) return ''
  if (typeof value === 'number') return String(value)
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value
  return csvCell(safe)
}

export function chartCsv(input: ChartInput): string {
  const { valueHeadings, values } = chartTable(input)
  return [valueHeadings, ...values].map((row) => row.map(csvField).join(',')).join('\r\n') + '\r\n'
}

/** One sentence for those who do not see the picture. */
export function chartSummary(input: ChartInput, tableBeside = false): string {
  const points = input.series.flatMap((series) => series.points)
  if (points.length === 0) return `${input.title}: no data.`
  const values = points.map((point) => point.y)
  const range = formatInterval(Math.min(...values), Math.max(...values))
  const names = input.series.length > 1 ? ` Series: ${input.series.map((series) => series.name).join(', ')}.` : ''
  const axis = axisName(input.kind === 'rates' ? input.x : input.y)
  return `${input.title}. ${axis}: ${range}, ${points.length} values.${names} The table ${tableBeside ? 'beside it' : 'beneath'} holds all of them.`
}
