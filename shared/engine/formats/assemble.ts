import { buildProblem } from '../problem/build'
import { negateProblem } from '../problem/negate'
import type { Directives } from './directives'
import { resolveSettings } from './directives'
import type { ProblemReading, ReadingIssue, ReadOptions } from './format'
import type { Rejections } from './rejections'
import { triangleOf } from './triangle'

const DEFAULTS = { firstRows: 8 }

/** What a format's reader has gathered, before convention, sense and duplicates are dealt with. */
export interface Gathered {
  readonly format: string
  readonly labels: string[]
  /** Entries by variable index, as the text states them. */
  readonly rows: ArrayLike<number>
  readonly cols: ArrayLike<number>
  readonly values: ArrayLike<number>
  /** True when no cell can be given twice, so that mirrored cells are no duplicates. */
  readonly isMatrix: boolean
  readonly directives: Directives
  readonly header: ProblemReading['header']
  readonly rejections: Rejections
  readonly issues: ReadingIssue[]
  /** What the format knows better than its entries tell. */
  readonly known?: Partial<Pick<ProblemReading, 'triangle' | 'duplicatesSummed' | 'firstRows' | 'entriesRead'>>
}

/** The first entries, by label. */
export function firstRowsOf({
  labels,
  rows,
  cols,
  values,
}: Pick<Gathered, 'labels' | 'rows' | 'cols' | 'values'>): [string, string, number][] {
  return Array.from({ length: Math.min(values.length, DEFAULTS.firstRows) }, (_, k): [string, string, number] => [
    labels[rows[k]!]!,
    labels[cols[k]!]!,
    values[k]!,
  ])
}

/** The reading that every format hands out: settings weighed, problem built and turned into a minimisation. */
export function assembleReading(gathered: Gathered, options: ReadOptions): ProblemReading {
  const { labels, directives, rejections } = gathered
  const resolved = resolveSettings(options, directives)
  const { offset, ...settings } = resolved.settings
  const issues = [...gathered.issues, ...resolved.issues]
  const built = issues.length > 0 ? null : buildProblem(labels.length, gathered, offset)
  const isMax = settings.sense === 'max'
  const isMinus = settings.convention === 'minus'
  return {
    format: gathered.format,
    ...settings,
    triangle: gathered.known?.triangle ?? triangleOf(labels.length, gathered),
    labels,
    problem: built && negateProblem(built.problem, { coefficients: isMax !== isMinus, offset: isMax }),
    duplicatesSummed: gathered.isMatrix ? 0 : (built?.duplicatesSummed ?? 0),
    zerosDropped: built?.zerosDropped ?? 0,
    rejected: rejections.lines,
    rejectedCount: rejections.count,
    rejectedList: rejections.list(),
    firstRows: firstRowsOf(gathered),
    entriesRead: gathered.values.length,
    header: gathered.header,
    issues,
    ...gathered.known,
  }
}
