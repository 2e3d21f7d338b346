import type { QuenchSeries } from '#shared/schemas/run-sheets'
import { quenchSeriesSchema } from '#shared/schemas/run-sheets'
import { parseTyped } from '../ui/parts'
import type { Typed } from './draft'

/** A quench series as it is typed: evenly between two values of s, or a list of them. */
export interface SeriesDraft {
  form: 'even' | 'list'
  from: Typed
  to: Typed
  count: Typed
  list: string
  /** Null: as fast as the machine takes. */
  quenchMicroseconds: Typed
}

export const NEW_SERIES: SeriesDraft = {
  form: 'even',
  from: 0.3,
  to: 0.7,
  count: 5,
  list: '',
  quenchMicroseconds: null,
}

/** s is written with four decimals, as in the schedule. */
const tidy = (s: number): number => Number(s.toFixed(4))
const MOST = 50

function evenPoints({ from, to, count }: SeriesDraft): number[] | string {
  if (from === null || to === null || !(from > 0 && from < to && to < 1))
    return 'Give two values of s between 0 and 1, the lower first.'
  if (count === null || !Number.isInteger(count) || count < 2 || count > MOST)
    return `Give a whole number of run sheets from 2 to ${MOST}.`
  return Array.from({ length: count }, (_, k) => tidy(from + ((to - from) * k) / (count - 1)))
}

function listedPoints({ list }: SeriesDraft): number[] | string {
  const points = list
    .split(/[\s;,]+/)
    .filter((word) => word !== '')
    .map((word) => parseTyped(word) ?? Number.NaN)
  return points.length === 0 || points.some((s) => !(s > 0 && s < 1))
    ? 'Give values of s between 0 and 1, with blanks between them.'
    : points.map(tidy)
}

/** What to ask the server for, or what is wrong with what was typed. */
export function readSeries(draft: SeriesDraft): { series: QuenchSeries } | { complaint: string } {
  const points = draft.form === 'even' ? evenPoints(draft) : listedPoints(draft)
  if (typeof points === 'string') return { complaint: points }
  const { quenchMicroseconds } = draft
  if (quenchMicroseconds !== null && !(quenchMicroseconds > 0))
    return { complaint: 'Give a time above 0 µs, or leave it empty.' }
  const read = quenchSeriesSchema.safeParse({ points, ...(quenchMicroseconds === null ? {} : { quenchMicroseconds }) })
  return read.success ? { series: read.data } : { complaint: `A series has ${read.error.issues[0]!.message}.` }
}
