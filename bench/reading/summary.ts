import { FINDING } from './baseline'
import type { FileCase } from './files'
import type { Measured } from './measure'

/** Reading may take this many times as long as the fastest loop, and this much memory in all. */
const BARS = { ratio: 4, mebibytes: 1024 }

export interface ReadingRow {
  readonly name: string
  readonly about: string
  readonly megabytes: number
  readonly variables: number
  readonly interactions: number
  /** Seconds of processor time: of the first reading, before anything is compiled, and the least. */
  readonly firstSeconds: number
  readonly leastSeconds: number
  /** The fastest loop that finds the ends of lines. */
  readonly finding: LoopFigures
  /** The fastest loop that makes each line a string or a view. */
  readonly making: LoopFigures
  readonly peakMebibytes: number
  readonly startMebibytes: number
  readonly isMet: boolean
  readonly rounds: Measured
}

export interface LoopFigures {
  readonly loop: string
  readonly seconds: number
  /** Times of this that reading takes. */
  readonly ratio: number
}

/** The fastest of some loops. */
function fastest(measured: Measured, isChosen: (loop: string) => boolean, reading: number): LoopFigures {
  return Object.entries(measured.loops)
    .filter(([loop]) => isChosen(loop))
    .map(([loop, rounds]) => ({ loop, seconds: Math.min(...rounds), ratio: reading / Math.min(...rounds) }))
    .reduce((best, figures) => (figures.seconds < best.seconds ? figures : best))
}

export function rowOf({ name, about }: FileCase, measured: Measured): ReadingRow {
  if (measured.rejected > 0) throw new Error(`${name}: ${measured.rejected} lines were rejected`)
  const leastSeconds = Math.min(...measured.reading)
  const finding = fastest(measured, (loop) => FINDING.includes(loop), leastSeconds)
  const making = fastest(measured, (loop) => !FINDING.includes(loop), leastSeconds)
  return {
    name,
    about,
    megabytes: measured.bytes / 1e6,
    variables: measured.variables,
    interactions: measured.interactions,
    firstSeconds: measured.reading[0]!,
    leastSeconds,
    finding,
    making,
    peakMebibytes: measured.peakMebibytes,
    startMebibytes: measured.startMebibytes,
    isMet: finding.ratio <= BARS.ratio && measured.peakMebibytes <= BARS.mebibytes,
    rounds: measured,
  }
}

const ms = (seconds: number): string => (1000 * seconds).toFixed(0)

export function tableOf(rows: readonly ReadingRow[]): string {
  const lines = [
    ['file', 'MB', 'first ms', 'least ms', 'finds lines', 'ms', 'ratio', 'makes lines', 'ms', 'ratio', 'peak MiB', ''],
    ...rows.map((row) => [
      row.name,
      row.megabytes.toFixed(1),
      ms(row.firstSeconds),
      ms(row.leastSeconds),
      ...[row.finding, row.making].flatMap(({ loop, seconds, ratio }) => [loop, ms(seconds), ratio.toFixed(1)]),
      row.peakMebibytes.toFixed(0),
      row.isMet ? 'met' : 'NOT MET',
    ]),
  ]
  const widths = lines[0]!.map((_, column) => Math.max(...lines.map((line) => line[column]!.length)))
  const isText = (column: number): boolean => [0, 4, 7, 11].includes(column)
  return lines
    .map((line) =>
      line
        .map((cell, c) => (isText(c) ? cell.padEnd(widths[c]!) : cell.padStart(widths[c]!)))
        .join('  ')
        .trimEnd(),
    )
    .join('\n')
}
