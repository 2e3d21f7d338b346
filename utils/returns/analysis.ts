import type { BreakGroup } from '#shared/engine/readout/grouped-breaks'
import type { AdviceFigure } from '#shared/engine/readout/advice/item'
import type { AdviceView, AnalysisView, Needed } from '#shared/schemas/return-analysis'
import type { ChartAxis, ChartSeries } from '../ui/chart/types'
import type { Fact } from '../ui/parts'
import {
  formatInterval,
  formatNumber,
  formatPercent,
  formatPercentInterval,
  formatSignificant,
  NO_VALUE,
} from '../format'
import { formatDuration } from '../formatTime'

/** How the analysis of returned samples reads. */

const PERCENT = { significant: 3 }

/** Two ends, the upper one open where nothing bounds it. */
function ends({ low, high }: Needed, show: (value: number) => string): string {
  if (low === null) return 'no upper end'
  return high === null ? `${show(low)} or more` : `${show(low)} to ${show(high)}`
}

const reads = (value: number): string => formatNumber(value, { significant: 3 })
const time = (milliseconds: number): string => formatDuration(milliseconds / 1000)

/** Success, R99 and time to solution, each with its interval. */
export function successFacts({ success }: Pick<AnalysisView, 'success'>, rehearsal: boolean): Fact[] {
  if (!success) return []
  const { count, total, rate: p, low, high, r99, milliseconds, millisecondsPerRead, isTimeMeasured } = success
  const given = { count, total, counted: 'reads within the gap', of: 'reads', format: PERCENT, rehearsal }
  return [
    {
      label: 'Success',
      value: formatPercent(p, PERCENT),
      note: formatPercentInterval(low, high, PERCENT),
      help: { id: 'rate', given },
    },
    { label: 'Reads there', value: formatNumber(count), note: `of ${formatNumber(total)}` },
    {
      label: 'R99',
      value: r99.value === null ? NO_VALUE : reads(r99.value),
      unit: 'reads',
      note: ends(r99, reads),
      ...(r99.value === null ? {} : { help: { id: 'r99', given: { p, reads: r99.value, rehearsal } } as const }),
    },
    {
      label: 'Time to solution',
      value: milliseconds.value === null ? NO_VALUE : time(milliseconds.value),
      note: ends(milliseconds, time),
      ...(r99.value === null
        ? {}
        : {
            help: {
              id: 'timeToSolution',
              given: {
                reads: r99.value,
                milliseconds: millisecondsPerRead,
                isMeasured: isTimeMeasured,
                rehearsal,
              },
            } as const,
          }),
    },
    {
      label: 'Time a read',
      value: time(millisecondsPerRead),
      note: isTimeMeasured ? 'measured' : 'estimate',
    },
  ]
}

export interface MeasureChart {
  title: string
  axis: ChartAxis
  series: ChartSeries[]
  fileName: string
}

const ratesOf = (groups: readonly BreakGroup[]): ChartSeries[] => [
  {
    name: 'broken chain reads',
    points: groups.map(({ mean, rate, low, high }) => ({ x: mean, y: 100 * rate, low: 100 * low, high: 100 * high })),
  },
]

/** Break rates against what chains are like. */
export const measureCharts = ({ breaks: { length, margin, degree } }: AnalysisView): MeasureChart[] => [
  {
    title: 'Against length',
    axis: { label: 'qubits in the chain', whole: true },
    series: ratesOf(length),
    fileName: 'breaks-length',
  },
  {
    title: 'Against margin',
    axis: { label: 'k less its cut bound', unit: 'in units of J' },
    series: ratesOf(margin),
    fileName: 'breaks-margin',
  },
  {
    title: 'Against degree',
    axis: { label: 'interactions of the variable', whole: true },
    series: ratesOf(degree),
    fileName: 'breaks-degree',
  },
]

const TESTED = { breaks: 'reads with a break', successes: 'reads within the gap', energies: 'decoded energies' }

/** What the tests between gauges say, one sentence a test. */
export const gaugeSentences = ({ gaugeTests }: AnalysisView) =>
  gaugeTests.map(({ of, statistic, degrees, adjusted, isReliable }) => {
    const p = adjusted < 1e-4 ? 'under 0.0001' : formatSignificant(adjusted, 2)
    const verdict = !isReliable ? 'too few reads to tell' : adjusted < 0.01 ? 'they differ' : 'no more than chance'
    return {
      of,
      what: TESTED[of].charAt(0).toUpperCase() + TESTED[of].slice(1),
      p,
      verdict,
      mark: (!isReliable ? 'computed' : adjusted < 0.01 ? 'caution' : 'passed') as 'computed' | 'caution' | 'passed',
      help: { id: 'gaugeTest', given: { of, statistic, degrees, adjusted } } as const,
    }
  })

/** Temperature of the samples and what another scale would do. */
export function temperatureFacts({ temperature, scale }: AnalysisView, rehearsal: boolean): Fact[] {
  if (!temperature) return []
  const { temperature: value, inverseTemperature: beta, standardError, rows, rowsInAll } = temperature
  const { outlook } = scale
  const error = beta !== null && standardError !== null ? standardError / beta ** 2 : null
  return [
    {
      label: 'Effective temperature',
      value: formatSignificant(value),
      ...(error === null ? {} : { note: `± ${formatSignificant(error, 2)}` }),
      help: { id: 'effectiveTemperature', given: { temperature: value, rows, rowsInAll, rehearsal } },
    },
    { label: 'Rows looked at', value: formatNumber(rows), note: `of ${formatNumber(rowsInAll)}` },
    { label: 'Scale', value: formatSignificant(scale.value), note: `at most ${formatSignificant(scale.greatest)}` },
    ...(outlook && beta !== null
      ? [
          {
            label: 'Programmed energy, scale + 10 %',
            value: formatSignificant(-outlook.fallByTenth),
            note: `± ${formatSignificant(outlook.standardError, 2)} as it is`,
            help: { id: 'scaleFall' as const, given: { fall: outlook.fallByTenth, beta, rehearsal } },
          },
        ]
      : []),
  ]
}

/** In one sentence what the temperature says about the scale. */
export function scaleSentence({ temperature, scale }: AnalysisView): string {
  if (!temperature) return 'The samples do not tell a temperature.'
  const { outlook, value, greatest, limitedBy } = scale
  if (!outlook)
    return 'No spin stands against its local field in a way that tells a temperature: a greater scale would not make these samples colder.'
  const isSeen = outlook.fallByTenth > 2 * outlook.standardError
  const gain = isSeen
    ? 'Were the samples thermal, a greater scale would lower the mean energy of what is programmed by more than its standard error, a lesser one raise it'
    : 'Were the samples thermal, a scale a tenth greater or lesser would change the mean energy of what is programmed by less than can be seen in so many reads'
  const room =
    greatest > value * (1 + 1e-9)
      ? `The ranges leave room up to ${formatSignificant(greatest)}.`
      : limitedBy === 'nothing'
        ? 'It is at 1, the greatest that is taken.'
        : `The ranges leave no room: ${limitedBy} is at its end.`
  return `${gain}. ${room}`
}

/** One figure that advice rests on. */
export function figureText({ value, low, high, unit }: AdviceFigure): string {
  if (unit === 'share') {
    const interval = low === undefined ? '' : ` (${formatPercentInterval(low, high, PERCENT)})`
    return `${formatPercent(value, PERCENT)}${interval}`
  }
  if (unit === 'chance') return value < 1e-4 ? 'under 0.0001' : formatSignificant(value, 2)
  const text = unit === 'count' ? formatNumber(value) : formatSignificant(value)
  const ended = low === undefined ? text : `${text} (${formatInterval(low, high)})`
  return unit === 'GHz' ? `${ended} GHz` : ended
}

/** Where to look for what no setting of a run sheet mends. */
export function placeOf(
  { action }: AdviceView,
  at: { embeddingId: string; machineId: string; problemId: string },
): { to: string; label: string } | null {
  if (!('look' in action)) return null
  if (action.look === 'embedding') return { to: `/embeddings/${at.embeddingId}`, label: 'Open the embedding' }
  if (action.look === 'machine') return { to: `/machines/${at.machineId}`, label: 'Open the machine' }
  if (action.look === 'groups') return { to: `/problems/${at.problemId}/groups`, label: 'Open the constraint groups' }
  return { to: `/problems/${at.problemId}`, label: 'Open the problem' }
}
