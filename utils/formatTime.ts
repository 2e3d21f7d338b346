import { formatNumber, NO_VALUE, THIN_SPACE } from './format'

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
]

export interface Quantity {
  value: string
  unit: string
}

type Instant = string | number | Date | null | undefined

const SI_STEPS: readonly (readonly [seconds: number, unit: string])[] = [
  [1, 's'],
  [1e-3, 'ms'],
  [1e-6, 'µs'],
  [1e-9, 'ns'],
]

/** A duration in seconds as value and SI unit, so that a page can set the unit smaller: `0.000072` is 72 µs. */
export function splitDuration(seconds: number, significant = 3): Quantity {
  if (seconds === 0) return { value: '0', unit: 's' }
  const size = Math.abs(seconds)
  const [step, unit] = SI_STEPS.find(([least]) => Number((size / least).toPrecision(significant)) >= 1) ?? [1e-9, 'ns']
  return { value: formatNumber(seconds / step, { significant }), unit }
}

/** A duration given in seconds: `72 µs`, `329.6 ms`, `41.2 s`, `2 min 5 s`, `1 h 20 min`. */
export function formatDuration(seconds: number | null | undefined, significant = 3): string {
  if (seconds === null || seconds === undefined || Number.isNaN(seconds)) return NO_VALUE
  if (!Number.isFinite(seconds)) return '∞'
  if (Math.abs(seconds) < 59.95) {
    const { value, unit } = splitDuration(seconds, significant)
    return `${value}${THIN_SPACE}${unit}`
  }
  return formatLong(Math.round(seconds))
}

function formatLong(seconds: number): string {
  const steps: [number, string][] = [
    [Math.floor(seconds / 86_400), 'd'],
    [Math.floor(seconds / 3600) % 24, 'h'],
    [Math.floor(seconds / 60) % 60, 'min'],
    [seconds % 60, 's'],
  ]
  const first = steps.findIndex(([count]) => count > 0)
  return steps
    .slice(first, first + 2)
    .filter(([count]) => count > 0)
    .map(([count, unit]) => `${count}${THIN_SPACE}${unit}`)
    .join(' ')
}

/** A duration given in microseconds, the unit of schedules and timing. */
export function formatMicroseconds(microseconds: number | null | undefined, significant = 4): string {
  if (microseconds === null || microseconds === undefined) return NO_VALUE
  return formatDuration(microseconds / 1e6, significant)
}

/** Elapsed time that keeps its width while it counts: always one place, `2.4 s`, and whole seconds after a minute. */
export function formatElapsed(seconds: number): string {
  if (seconds < 60) return `${formatNumber(seconds, { decimals: 1 })}${THIN_SPACE}s`
  return formatLong(Math.floor(seconds))
}

function parse(instant: Instant): Date | null {
  if (instant === null || instant === undefined) return null
  const date = new Date(instant)
  return Number.isNaN(date.getTime()) ? null : date
}

const two = (value: number) => String(value).padStart(2, '0')
const shortMonth = (date: Date) => (MONTHS[date.getUTCMonth()] ?? '').slice(0, 3)

// Times are shown in UTC everywhere: server and browser then write the same text, whoever looks from wherever.

/** `3 Dec, 14:20` (UTC). */
export function formatDateTime(instant: Instant): string {
  const date = parse(instant)
  if (!date) return NO_VALUE
  return `${formatDay(date)}, ${two(date.getUTCHours())}:${two(date.getUTCMinutes())}`
}

/** `3 Dec` (UTC). */
export function formatDay(instant: Instant): string {
  const date = parse(instant)
  return date ? `${date.getUTCDate()} ${shortMonth(date)}` : NO_VALUE
}

/** `3 December 2026` (UTC). */
export function formatLongDate(instant: Instant): string {
  const date = parse(instant)
  return date ? `${date.getUTCDate()} ${MONTHS[date.getUTCMonth()]} ${date.getUTCFullYear()}` : NO_VALUE
}

/** `3 Dec 2026, 14:20 UTC`: for titles and exports, where nothing may be left to guess. */
export function formatFullTime(instant: Instant): string {
  const date = parse(instant)
  if (!date) return NO_VALUE
  return `${formatDay(date)} ${date.getUTCFullYear()}, ${two(date.getUTCHours())}:${two(date.getUTCMinutes())} UTC`
}
