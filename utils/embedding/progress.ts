import type { EmbeddingProgress, TracePoint } from '#shared/schemas/embeddings'
import type { JobView } from '#shared/schemas/jobs'
import type { ChartSeries } from '../ui/chart/types'
import { METHOD_NAMES, phaseWords } from './methods'
import { formatCount, formatNumber } from '../format'

/** The figures of a running search; null until it has reported. */
export function progressOf(job: JobView | null): EmbeddingProgress | null {
  const detail = job?.detail as Partial<EmbeddingProgress> | undefined
  return typeof detail?.overlap === 'number' && typeof detail.tryNumber === 'number'
    ? (detail as EmbeddingProgress)
    : null
}

/** `longest chain 6, 128 qubits`, or that there is none. */
export function bestWords({
  longestChain,
  qubitsUsed,
}: Pick<EmbeddingProgress, 'longestChain' | 'qubitsUsed'>): string {
  if (longestChain === null) return 'none valid so far'
  return `best so far: longest chain ${formatNumber(longestChain)}, ${formatCount(qubitsUsed ?? 0, 'qubit')}`
}

/** `Search, try 3 of 8, rerouting chains that overlap; 2 tries at work` */
export function workWords({ method, tryNumber, tries, phase, running }: EmbeddingProgress): string {
  const name = METHOD_NAMES[method] ?? method
  const place = tries > 1 ? `, try ${formatNumber(tryNumber)} of ${formatNumber(tries)}` : ''
  const others = running > 1 ? `; ${formatNumber(running)} tries at work` : ''
  return `${name.charAt(0).toUpperCase()}${name.slice(1)}${place}, ${phaseWords(phase)}${others}`
}

/** One small chart of the course of a search. */
export interface CourseChart {
  readonly title: string
  readonly unit: string
  readonly series: ChartSeries
  readonly instead: string
}

const COURSES = [
  { key: 'overlap', title: 'Overlap', unit: 'uses too many' },
  { key: 'longestChain', title: 'Longest chain', unit: 'qubits' },
  { key: 'qubitsUsed', title: 'Qubits used', unit: 'qubits' },
] as const

/**
 * Overlap, longest chain and qubits over seconds, without the moments that had no such figure. A course without points
 * has nothing to draw; `instead` says why.
 */
export function courseCharts(trace: readonly TracePoint[]): CourseChart[] {
  const isValidThroughout = trace.length > 0 && trace.every(({ overlap }) => overlap === 0)
  return COURSES.map(({ key, title, unit }) => {
    const moments = key === 'overlap' && isValidThroughout ? [] : trace
    const points = moments.flatMap((point) => (point[key] === null ? [] : [{ x: point.seconds, y: point[key] }]))
    const waiting = trace.length > 0 ? 'No valid embedding yet.' : 'Nothing reported yet.'
    const instead = isValidThroughout ? 'None: the chains are valid throughout.' : waiting
    return { title, unit, instead, series: { name: title, marker: 'none', points } }
  })
}
