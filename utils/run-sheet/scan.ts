import type { RunSheetView } from '#shared/schemas/run-sheets'
import type { ReturnedAtStrength, ScanPoint, ScanView } from '#shared/schemas/scans'
import type { ChartSeries } from '../ui/chart/types'
import { formatCount, formatSignificant } from '../format'

const DIGITS = 3
const round = (value: number): number => Number(value.toPrecision(DIGITS))

/** `count` strengths from the least to the most, evenly apart on a logarithmic scale, in three digits and each once. */
export function logSpaced(least: number, most: number, count: number): number[] {
  const ratio = most / least
  const strengths = Array.from({ length: count }, (_, k) => round(least * ratio ** (count === 1 ? 0 : k / (count - 1))))
  return [...new Set(strengths)]
}

/** Where a scan begins and ends unless somebody says otherwise: from well under to above what the rules ask for. */
export function scanRange({ rules }: Pick<RunSheetView, 'rules'>): { least: number; most: number } {
  const known = rules.filter(({ k }) => k.max > 0)
  const least = Math.min(...known.map(({ k }) => k.max)) / 4
  const most = Math.max(...known.map(({ k }) => k.max)) * 1.5
  return Number.isFinite(least) && least < most ? { least: round(least), most: round(most) } : { least: 0.25, most: 4 }
}

type Figures = (point: ScanPoint) => { y: number; low?: number; high?: number }
const pointsOf = (scan: ScanView, figures: Figures) =>
  scan.points.map((point) => ({ x: point.strength, ...figures(point) }))
const percent = ({ rate, low, high }: { rate: number; low: number; high: number }) => ({
  y: 100 * rate,
  low: 100 * low,
  high: 100 * high,
})

const RETURNED = 'returned samples'

/** Shares of broken chains, and of reads with any break, in per cent. */
export function breakSeries(scan: ScanView, returned: readonly ReturnedAtStrength[]): ChartSeries[] {
  const series: ChartSeries[] = [
    {
      name: 'chains, mean of a read',
      points: pointsOf(scan, ({ brokenChains: { mean, low, high } }) => percent({ rate: mean, low, high })),
    },
    {
      name: 'reads with any break',
      stroke: 'dashed',
      marker: 'plus',
      points: pointsOf(scan, ({ readsWithBreak }) => percent(readsWithBreak)),
    },
  ]
  if (returned.length === 0) return series
  const points = returned.map(({ strength, readsWithBreak }) => ({ x: strength, ...percent(readsWithBreak) }))
  return [...series, { name: `${RETURNED}, reads with any break`, kind: 'points', marker: 'hollow', points }]
}

/** Mean decoded energy with twice its standard error, and the best one. */
export function energySeries(scan: ScanView, returned: readonly ReturnedAtStrength[]): ChartSeries[] {
  const series: ChartSeries[] = [
    {
      name: 'mean decoded',
      points: pointsOf(scan, ({ energy: { mean, standardError } }) => ({
        y: mean,
        low: mean - 2 * standardError,
        high: mean + 2 * standardError,
      })),
    },
    {
      name: 'best decoded',
      stroke: 'dashed',
      marker: 'plus',
      points: pointsOf(scan, ({ energy }) => ({ y: energy.best })),
    },
  ]
  if (returned.length === 0) return series
  const points = returned.map(({ strength, best }) => ({ x: strength, y: best }))
  return [...series, { name: `${RETURNED}, best decoded`, kind: 'points', marker: 'hollow', points }]
}

/** Share of reads that reach the reference optimum, in per cent; empty where none is known. */
export function successSeries(scan: ScanView): ChartSeries[] {
  const points = scan.points.flatMap(({ strength, success }) => (success ? [{ x: strength, ...percent(success) }] : []))
  return points.length === 0 ? [] : [{ name: 'reads at the reference optimum', points }]
}

/** What a scan says, in a sentence. */
export function kneeText({ knee, points, status }: ScanView): string {
  if (status === 'running') return `${formatCount(points.length, 'strength')} measured so far.`
  if (!knee) return 'Too few strengths were measured to tell where the knee is.'
  const k = formatSignificant(knee.strength, DIGITS)
  if (knee.edge === 'weakest')
    return `The weakest strength tried, ${k}, is as good as any. Scan again from weaker ones: the knee lies at or below it.`
  if (knee.edge === 'strongest')
    return `The strongest strength tried, ${k}, is the best. Scan again with stronger ones: the knee lies at or above it.`
  return `From ${k} on, stronger chains gain nothing that this scan can tell: the knee.`
}
