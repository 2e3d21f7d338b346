import { groupDigits, THIN_SPACE } from '#shared/engine/digits'

export { THIN_SPACE }
/** The true minus, as wide as a plus. */
export const MINUS = '\u2212'
/** Shown where there is no value. */
export const NO_VALUE = '–'

export interface NumberFormat {
  /** Fixed number of places after the point. */
  decimals?: number
  /** Significant digits; trailing zeros are kept only up to the point unless `decimals` is given. */
  significant?: number
  /** Write a plus before positive numbers. */
  signed?: boolean
}

const DEFAULTS = { significant: 6, exponentFrom: 1e7, exponentBelow: 1e-4 } as const

type Maybe = number | null | undefined

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

function superscript(exponent: number): string {
  const digits = [...String(Math.abs(exponent))].map((digit) => SUPERSCRIPTS[Number(digit)]).join('')
  return exponent < 0 ? `⁻${digits}` : digits
}

function withExponent(size: number, significant: number): string {
  const [mantissa = '', exponent = '0'] = size.toExponential(significant - 1).split('e')
  return `${trimZeros(mantissa)}${THIN_SPACE}×${THIN_SPACE}10${superscript(Number(exponent))}`
}

function trimZeros(text: string): string {
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text
}

function formatSize(size: number, format: NumberFormat): string {
  if (format.decimals !== undefined) return groupFixed(size.toFixed(format.decimals))
  const significant = format.significant ?? DEFAULTS.significant
  if (size === 0) return '0'
  if (Number.isInteger(size) && size < Number.MAX_SAFE_INTEGER && format.significant === undefined) {
    return groupDigits(size.toFixed(0))
  }
  if (size >= DEFAULTS.exponentFrom || size < DEFAULTS.exponentBelow) return withExponent(size, significant)
  const rounded = Number(size.toPrecision(significant))
  const places = Math.max(0, significant - 1 - Math.floor(Math.log10(rounded)))
  return groupFixed(trimZeros(rounded.toFixed(places)))
}

function groupFixed(text: string): string {
  const [whole = '0', fraction] = text.split('.')
  return fraction === undefined ? groupDigits(whole) : `${groupDigits(whole)}.${fraction}`
}

/** A number for reading: true minus, thin spaces between thousands; whole numbers in full, others to six digits. */
export function formatNumber(value: Maybe, format: NumberFormat = {}): string {
  if (value === null || value === undefined || Number.isNaN(value)) return NO_VALUE
  const size = Number.isFinite(value) ? formatSize(Math.abs(value), format) : '∞'
  const isZero = !/[1-9∞]/.test(size)
  const sign = isZero ? '' : value < 0 ? MINUS : format.signed ? '+' : ''
  return sign + size
}

/** A number to so many significant digits, without trailing zeros after the point. */
export function formatSignificant(value: Maybe, significant = 3): string {
  return formatNumber(value, { significant })
}

/** A fraction between 0 and 1 as per cent: `0.857` becomes `85.7 %`. */
export function formatPercent(fraction: Maybe, format: NumberFormat = { significant: 3 }): string {
  if (fraction === null || fraction === undefined || Number.isNaN(fraction)) return NO_VALUE
  return `${formatNumber(fraction * 100, format)}${THIN_SPACE}%`
}

/** Places after the point that both ends of an interval take: the larger one has so many significant digits. */
function commonPlaces(low: number, high: number, significant: number): number | undefined {
  const size = Math.max(Math.abs(low), Math.abs(high))
  if (size === 0 || size >= DEFAULTS.exponentFrom || size < DEFAULTS.exponentBelow) return undefined
  const places = Math.max(0, significant - Math.ceil(Math.log10(size)))
  const areWhole = [low, high].every((end) => Number.isInteger(Number(end.toFixed(places))))
  return areWhole ? 0 : places
}

/**
 * An interval: `12–17`, both ends to the same place, `6.0–9.3`; with a negative end the dash would read as a minus, so
 * `−4 to 4`.
 */
export function formatInterval(low: Maybe, high: Maybe, format: NumberFormat = { significant: 3 }): string {
  const { decimals, significant = 3 } = format
  const places =
    decimals ?? (Number.isFinite(low) && Number.isFinite(high) ? commonPlaces(low!, high!, significant) : undefined)
  const ends = [low, high].map((end) => formatNumber(end, { ...format, decimals: places }))
  if (ends[0] === NO_VALUE || ends[1] === NO_VALUE) return NO_VALUE
  return ends.some((end) => end.startsWith(MINUS)) ? ends.join(' to ') : ends.join('–')
}

/** An interval of fractions in per cent, without the sign: `0.12`, `0.17` become `12–17`. */
export function formatPercentInterval(low: Maybe, high: Maybe, format: NumberFormat = { significant: 3 }): string {
  const hundred = (value: Maybe) => (value === null || value === undefined ? value : value * 100)
  return formatInterval(hundred(low), hundred(high), format)
}

/** A count with its noun: `1 read`, `1 000 reads`; nought is `no reads`. */
export function formatCount(count: number, one: string, many = `${one}s`): string {
  if (count === 0) return `no ${many}`
  return `${formatNumber(count)} ${count === 1 ? one : many}`
}

const BYTE_UNITS = ['B', 'kB', 'MB', 'GB', 'TB'] as const

/** A size in bytes with decimal units: `1 200 000` becomes `1.2 MB`. */
export function formatBytes(bytes: Maybe): string {
  if (bytes === null || bytes === undefined || Number.isNaN(bytes)) return NO_VALUE
  let step = 0
  let size = Math.abs(bytes)
  while (size >= 999.5 && step < BYTE_UNITS.length - 1) {
    size /= 1000
    step += 1
  }
  const text = formatNumber(Math.sign(bytes) * size, step === 0 ? { decimals: 0 } : { significant: 3 })
  return `${text}${THIN_SPACE}${BYTE_UNITS[step]}`
}

/** The first bytes of a fingerprint in groups of four, as a person would compare them: `9c41 e07d`. */
export function formatFingerprint(hex: string, groups = 2): string {
  return (hex.match(/.{1,4}/g) ?? []).slice(0, groups).join(' ')
}
