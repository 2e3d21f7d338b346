import type { Run } from './measure'
import type { Bar, Row } from './rows'

/** Medians over the seeds that found an embedding; null where none did. */
export interface Side {
  readonly found: number
  readonly seeds: number
  readonly firstSeconds: number | null
  readonly seconds: number | null
  readonly firstQubits: number | null
  readonly qubits: number | null
  readonly longest: number | null
  readonly mean: number | null
  readonly methods: readonly string[]
  readonly faults: readonly string[]
  readonly runs: readonly Run[]
}

export interface RowResult {
  readonly name: string
  readonly timeLimitSeconds: number
  readonly bars: readonly (Bar & { readonly met: boolean })[]
  readonly engine: Side
  readonly baseline: Side | null
  /** Median over the seeds that both found of engine's qubits / baseline's qubits, when both were done. */
  readonly ratio: number | null
  /** The same against the baseline's first valid embedding, before its passes that shorten. */
  readonly ratioToFirst: number | null
}

export function median(values: readonly number[]): number | null {
  if (values.length === 0) return null
  const sorted = [...values].sort((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1]! + sorted[sorted.length >> 1]!) / 2
}

export function sideOf(runs: readonly Run[]): Side {
  const found = runs.filter((run) => run.found)
  const medianOf = (key: 'firstSeconds' | 'firstQubits' | 'qubits' | 'longest' | 'mean'): number | null =>
    median(found.flatMap((run) => run[key] ?? []))
  return {
    found: found.length,
    seeds: runs.length,
    firstSeconds: medianOf('firstSeconds'),
    seconds: median(runs.map(({ seconds }) => seconds)),
    firstQubits: medianOf('firstQubits'),
    qubits: medianOf('qubits'),
    longest: medianOf('longest'),
    mean: medianOf('mean'),
    methods: [...new Set(found.flatMap(({ method }) => method ?? []))],
    faults: runs.flatMap(({ fault }) => fault ?? []),
    runs,
  }
}

function isMet({ measure, limit }: Bar, engine: Side, ratio: number | null): boolean {
  if (engine.found === 0 || 2 * engine.found < engine.seeds) return false
  if (measure === 'found') return true
  const value = measure === 'ratio' ? ratio : measure === 'qubits' ? engine.qubits : engine.firstSeconds
  return value !== null && value <= limit
}

export function resultOf(row: Row, engineRuns: readonly Run[], baselineRuns: readonly Run[] | null): RowResult {
  const engine = sideOf(engineRuns)
  const baseline = baselineRuns && sideOf(baselineRuns)
  const ratioTo = (key: 'qubits' | 'firstQubits'): number | null =>
    median(
      engineRuns.flatMap(({ seed, qubits }) => {
        const other = baselineRuns?.find((run) => run.seed === seed)?.[key]
        return qubits && other ? [qubits / other] : []
      }),
    )
  const ratio = ratioTo('qubits')
  const bars = row.bars.map((bar) => ({ ...bar, met: isMet(bar, engine, ratio) }))
  const { name, timeLimitSeconds } = row
  return { name, timeLimitSeconds, bars, engine, baseline, ratio, ratioToFirst: ratioTo('firstQubits') }
}

const shown = (value: number | null, digits: number): string => (value === null ? '–' : value.toFixed(digits))

const COLUMNS: readonly (readonly [title: string, cell: (result: RowResult) => string])[] = [
  ['instance', ({ name }) => name],
  ['limit s', ({ timeLimitSeconds }) => String(timeLimitSeconds)],
  [
    'bars',
    ({ bars }) =>
      bars
        .map(({ level, measure, limit, met }) => {
          const asked = measure === 'found' ? 'found' : `${measure} ≤ ${limit}`
          return `${met ? '✓' : '✕'} ${level === 'hard' ? '' : 'moonshot '}${asked}`
        })
        .join(', ') || '–',
  ],
  ['found', ({ engine }) => `${engine.found}/${engine.seeds}`],
  ['first s', ({ engine }) => shown(engine.firstSeconds, 2)],
  ['total s', ({ engine }) => shown(engine.seconds, 2)],
  ['qubits', ({ engine }) => shown(engine.qubits, 0)],
  ['longest', ({ engine }) => shown(engine.longest, 1)],
  ['mean', ({ engine }) => shown(engine.mean, 2)],
  ['method', ({ engine }) => engine.methods.join(' ') || '–'],
  ['baseline found', ({ baseline }) => (baseline ? `${baseline.found}/${baseline.seeds}` : '–')],
  ['first s', ({ baseline }) => shown(baseline?.firstSeconds ?? null, 2)],
  ['first qubits', ({ baseline }) => shown(baseline?.firstQubits ?? null, 0)],
  ['qubits', ({ baseline }) => shown(baseline?.qubits ?? null, 0)],
  ['longest', ({ baseline }) => shown(baseline?.longest ?? null, 1)],
  ['ratio', ({ ratio }) => shown(ratio, 2)],
  ['ratio to first', ({ ratioToFirst }) => shown(ratioToFirst, 2)],
]

/** One line of the measurement, for people who wait. */
export function lineOf(result: RowResult): string {
  const cells = COLUMNS.slice(2).map(([title, cell]) => `${title} ${cell(result)}`)
  const faults = [...new Set([...result.engine.faults, ...(result.baseline?.faults ?? [])])]
  return [`${result.name}:`, cells.join(' · '), ...faults.map((fault) => `\n    fault: ${fault}`)].join(' ')
}

/** The same as a table in Markdown. */
export function tableOf(results: readonly RowResult[]): string {
  const rows = results.map((result) => COLUMNS.map(([, cell]) => cell(result)))
  const head = COLUMNS.map(([title]) => title)
  const line = (cells: readonly string[]): string => `| ${cells.join(' | ')} |`
  return [line(head), line(head.map(() => '---')), ...rows.map(line)].join('\n')
}
