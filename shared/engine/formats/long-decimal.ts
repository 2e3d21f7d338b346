/**
 * Decimal numbers of 16 … 19 digits, as the full writing of a double has: digits and quotient are held as sums of two
 * doubles (T. J. Dekker, A floating-point technique for extending the available precision, Numer. Math. 18, 1971). The
 * quotient is off by less than 2⁻¹⁰⁰ of itself, so that rounding it is right unless it lies that close to the middle between
 * two doubles; then the number is left to the general way.
 */

/** 2²⁷ + 1: cuts a double in halves whose products are exact. */
const SPLITTER = 134_217_729
/** Wider than the error of the second part, and of the first where the second vanishes. */
const DOUBT = { second: 2 ** -44, first: 2 ** -98 }

function halfOf(value: number): number {
  const scaled = SPLITTER * value
  return scaled - (scaled - value)
}

/** What a · b lacks of its exact value. */
function productError(a: number, b: number, product: number): number {
  const aHigh = halfOf(a)
  const bHigh = halfOf(b)
  const aLow = a - aHigh
  const bLow = b - bHigh
  return aHigh * bHigh - product + aHigh * bLow + aLow * bHigh + aLow * bLow
}

/**
 * (high · scale + low) / divisor, rounded once; NaN when rounding cannot be told.
 * @param high whole number below 10¹⁵
 * @param scale power of ten up to 10⁴, above `low`
 * @param divisor power of ten up to 10²²
 */
export function longQuotient(high: number, scale: number, low: number, divisor: number): number {
  const product = high * scale
  const rest = productError(high, scale, product) + low
  const digits = product + rest
  const digitsError = rest - (digits - product)
  const quotient = digits / divisor
  const back = quotient * divisor
  const second = (digits - back - productError(quotient, divisor, back) + digitsError) / divisor
  const doubt = Math.abs(second) * DOUBT.second + quotient * DOUBT.first
  const value = quotient + (second + doubt)
  return value === quotient + (second - doubt) ? value : Number.NaN
}
