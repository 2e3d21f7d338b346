import type { ViewCase } from './cases'
import type { Measured } from './measure'

export interface Figures {
  readonly median: number
  readonly p95: number
  readonly worst: number
}

export interface GestureRow extends Figures {
  readonly gesture: string
  readonly frames: number
  /** Longest task of the main thread, 0 when none took 50 ms. */
  readonly longestTask: number
  readonly isMet: boolean
}

export interface CaseRow {
  readonly name: string
  readonly size: Measured['size']
  /** Milliseconds from the data's arrival, of the round that took the median time. */
  readonly firstPaint: number
  readonly isPaintMet: boolean
  /** Milliseconds until the pointer can move the picture. */
  readonly ready: number
  readonly gestures: readonly GestureRow[]
}

/** @throws RangeError when there are no values */
export function figuresOf(values: readonly number[]): Figures {
  if (values.length === 0) throw new RangeError('no frame was recorded')
  const sorted = [...values].sort((a, b) => a - b)
  const at = (share: number) => sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))]!
  return { median: at(0.5), p95: at(0.95), worst: sorted.at(-1)! }
}

/** Several rounds of one case, frames put together. The worst frame is that of the round whose worst is the median. */
export function rowOf({ name, bars }: ViewCase, rounds: readonly Measured[]): CaseRow {
  const firstPaint = figuresOf(rounds.map((round) => round.firstPaint)).median
  const ready = figuresOf(rounds.map((round) => round.ready)).median
  const gestures = rounds[0]!.gestures.map(({ name: gesture }, k) => {
    const recordings = rounds.map((round) => round.gestures[k]!.recording)
    const frames = recordings.flatMap((recording) => recording.frames)
    const { median, p95 } = figuresOf(frames)
    const worst = figuresOf(recordings.map((recording) => Math.max(...recording.frames))).median
    const longestTask = figuresOf(recordings.map(({ longTasks }) => Math.max(0, ...longTasks))).median
    const isMet = median <= bars.frame && worst <= bars.worst
    return { gesture, frames: frames.length, median, p95, worst, longestTask, isMet }
  })
  return { name, size: rounds[0]!.size, firstPaint, isPaintMet: firstPaint <= bars.paint, ready, gestures }
}

const ms = (value: number) => value.toFixed(value < 100 ? 1 : 0)
const verdict = (isMet: boolean) => (isMet ? 'met' : 'NOT MET')

export function tableOf(rows: readonly CaseRow[], cases: readonly ViewCase[]): string {
  const lines = [['case', 'gesture', 'frames', 'median', '95 %', 'worst', 'longest task', 'bar', '']]
  for (const { name, size, firstPaint, isPaintMet, ready, gestures } of rows) {
    const { bars } = cases.find((candidate) => candidate.name === name)!
    const about = `${size.qubits} qubits, ${size.couplers} couplers, ${size.chains} chains`
    lines.push([name, `first paint (${about})`, '', ms(firstPaint), '', '', '', `${bars.paint}`, verdict(isPaintMet)])
    lines.push(['', 'can be moved', '', ms(ready), '', '', '', '', ''])
    for (const { gesture, frames, median, p95, worst, longestTask, isMet } of gestures)
      lines.push(
        ['', gesture, `${frames}`, ms(median), ms(p95), ms(worst), ms(longestTask)].concat(
          `${bars.frame}, worst ${bars.worst}`,
          verdict(isMet),
        ),
      )
  }
  const widths = lines[0]!.map((_, column) => Math.max(...lines.map((line) => line[column]!.length)))
  const isText = (column: number) => column < 2 || column > 6
  return lines
    .map((line) =>
      line
        .map((cell, c) => (isText(c) ? cell.padEnd(widths[c]!) : cell.padStart(widths[c]!)))
        .join('  ')
        .trimEnd(),
    )
    .join('\n')
}
