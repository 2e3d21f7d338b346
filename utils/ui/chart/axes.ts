import type { ScaleOptions } from 'chart.js'
import type { Palette } from '../../../assets/css/tokens'
import { formatNumber } from '../../format'
import { axisName } from './axisName'
import { logTicks, wholeTicks } from './ticks'
import type { ChartAxis } from './types'

const SANS = '"IBM Plex Sans", sans-serif'
const AXIS_FONT = { family: '"IBM Plex Mono", monospace', size: 12 }
/** From this height a chart has room for more gridlines. */
const TALL = 180
const mostUp = ({ height }: { height: number }): number => (height > TALL ? 7 : 5)

/** Mean width of a letter of an axis name, in px. */
const LETTER = 6.2

/** A unit of a letter or two stays with the word before it. */
const unbroken = (name: string): string => name.replace(/ (\S{1,2})$/, '\u00a0$1')

/** Words in as few lines as fit into a width: a name that is too long would be squeezed. */
export function inLines(text: string, width: number): string[] {
  const most = Math.max(1, Math.floor(width / LETTER))
  const lines: string[] = []
  for (const word of text.split(' ')) {
    const longer = lines.length ? `${lines.at(-1)} ${word}` : word
    if (lines.length > 0 && longer.length <= most) lines[lines.length - 1] = longer
    else lines.push(word)
  }
  return lines
}

/** Options of one axis: across it has an ink baseline, ticks and its name; up it has hairline gridlines only. */
export function axisOptions(
  axis: ChartAxis,
  palette: Palette,
  role: 'across' | 'up',
  values: readonly number[] = [],
  /** Px beside the plot that an axis name has no room in. */
  beside = 56,
): ScaleOptions<'linear' | 'logarithmic'> {
  const across = role === 'across'
  return {
    type: axis.scale === 'log' ? 'logarithmic' : 'linear',
    offset: false,
    min: axis.min,
    max: axis.max,
    suggestedMin: values.length ? Math.min(...values) : undefined,
    suggestedMax: values.length ? Math.max(...values) : undefined,
    afterBuildTicks: (scale: { min: number; max: number; ticks: { value: number }[]; chart: { height: number } }) => {
      const room = across ? undefined : mostUp(scale.chart)
      const ticks =
        axis.scale === 'log' ? logTicks(scale.min, scale.max, room) : across ? wholeTicks(values) : undefined
      if (ticks) scale.ticks = ticks.map((value) => ({ value }))
    },
    border: { display: across, color: palette.ink, width: 1 },
    grid: {
      display: true,
      offset: false,
      drawOnChartArea: !across,
      drawTicks: across,
      tickLength: across ? 5 : 0,
      color: across ? palette.ink : palette.hair,
    },
    ticks: {
      color: palette.ink2,
      font: AXIS_FONT,
      padding: across ? 2 : 8,
      maxTicksLimit: across ? 11 : (context: { chart: { height: number } }) => mostUp(context.chart),
      // Those of a log axis are few enough already; leaving out every other one would be uneven.
      autoSkip: across || axis.scale !== 'log',
      includeBounds: false,
      maxRotation: 0,
      autoSkipPadding: across ? 12 : 4,
      precision: axis.categories || axis.whole ? 0 : undefined,
      callback: (value: string | number) => axis.categories?.[Number(value)] ?? formatNumber(Number(value)),
    },
    title: across
      ? {
          display: true,
          text: (context: { chart: { width: number } }) =>
            inLines(unbroken(axisName(axis)), context.chart.width - beside),
          align: 'end',
          color: palette.ink2,
          font: { family: SANS, size: 12, weight: 'normal' },
          padding: { top: 2 },
        }
      : { display: false },
  } as ScaleOptions<'linear' | 'logarithmic'>
}
