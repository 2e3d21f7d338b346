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
  readonly loop: string
  readonly loopSeconds: number
  readonly ratio: number
  readonly peakMebibytes: number
  readonly startMebibytes: number
  readonly isMet: boolean
  readonly rounds: Measured
}

export function rowOf({ name, about }: FileCase, measured: Measured): ReadingRow {
  if (measured.rejected > 0) throw new Error(`${name}: ${measured.rejected} lines were rejected`)
  const leastSeconds = Math.min(...measured.reading)
  const [loop, loopSeconds] = Object.entries(measured.loops)
    .map(([loopName, rounds]) => [loopName, Math.min(...rounds)] as const)
    .reduce((best, entry) => (entry[1] < best[1] ? entry : best))
  const ratio = leastSeconds / loopSeconds
  return {
    name,
    about,
    megabytes: measured.bytes / 1e6,
    variables: measured.variables,
    interactions: measured.interactions,
    firstSeconds: measured.reading[0]!,
    leastSeconds,
    loop,
    loopSeconds,
    ratio,
    peakMebibytes: measured.peakMebibytes,
    startMebibytes: measured.startMebibytes,
    isMet: ratio <= BARS.ratio && measured.peakMebibytes <= BARS.mebibytes,
    rounds: measured,
  }
}

const ms = (seconds: number): string => (1000 * seconds).toFixed(0)

export function tableOf(rows: readonly ReadingRow[]): string {
  const lines = [
    ['file', 'MB', 'interactions', 'first ms', 'least ms', 'fastest loop', 'ms', 'ratio', 'peak MiB', ''],
    ...rows.map((row) => [
      row.name,
      row.megabytes.toFixed(1),
      String(row.interactions),
      ms(row.firstSeconds),
      ms(row.leastSeconds),
      row.loop,
      ms(row.loopSeconds),
      row.ratio.toFixed(1),
      row.peakMebibytes.toFixed(0),
      row.isMet ? 'met' : 'NOT MET',
    ]),
  ]
  const widths = lines[0]!.map((_, column) => Math.max(...lines.map((line) => line[column]!.length)))
  const isText = (column: number): boolean => column === 0 || column === 5 || column === 9
  return lines
    .map((line) =>
      line
        .map((cell, c) => (isText(c) ? cell.padEnd(widths[c]!) : cell.padStart(widths[c]!)))
        .join('  ')
        .trimEnd(),
    )
    .join('\n')
}
