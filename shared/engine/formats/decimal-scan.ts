/**
 * Decimal numbers straight from bytes. With at most 15 significant digits and a power of ten up to 22, digits and power
 * are exact doubles, so that one multiplication or division rounds correctly (W. D. Clinger, How to read floating point
 * numbers accurately, PLDI 1990, the fast path). A few digits more go through `long-decimal.ts`; anything else is left to the
 * general way.
 */
import { longQuotient } from './long-decimal'

const MOST_POWER = 22
/** Digits of either part that fit 32-bit integers. */
const MOST_PART = 9
const MOST_DIGITS = 15
/** Digits that a whole double and a 32-bit integer hold together. */
const MOST_LONG = 19
const POWERS = Float64Array.from({ length: MOST_POWER + 1 }, (_, k) => Number(`1e${k}`))

const PLUS = 0x2b
const MINUS = 0x2d
const POINT = 0x2e
const ZERO = 0x30
const LETTER_E = 0x65
const LOWER_CASE = 0x20
const MOST_EXPONENT_DIGITS = 3
const NONE = -1

/** Reads one number at a time: `scan` answers where it ends, `value` holds it. */
export class DecimalScan {
  value = 0
  private exponent = 0

  /**
   * The position after the number that begins at `from`, or −1 when there is none that is exact this way. The bytes must
   * hold something that is no digit behind it.
   */
  scan(bytes: Uint8Array, from: number): number {
    let p = from
    let code = bytes[p]!
    const isNegative = code === MINUS
    if (isNegative || code === PLUS) code = bytes[++p]!
    let whole = 0
    const wholeFrom = p
    for (; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!) whole = (Math.imul(whole, 10) + code - ZERO) | 0
    const wholeDigits = p - wholeFrom
    let fraction = 0
    let fractionDigits = 0
    if (code === POINT) {
      const fractionFrom = p + 1
      code = bytes[++p]!
      for (; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!)
        fraction = (Math.imul(fraction, 10) + code - ZERO) | 0
      fractionDigits = p - fractionFrom
    }
    const digits = wholeDigits + fractionDigits
    if (digits === 0) return NONE
    if (digits > MOST_DIGITS || wholeDigits > MOST_PART || fractionDigits > MOST_PART)
      return this.scanLong(bytes, wholeFrom, isNegative)
    let size = whole
    if (fractionDigits > 0) size = (whole * POWERS[fractionDigits]! + fraction) / POWERS[fractionDigits]!
    if ((code | LOWER_CASE) === LETTER_E)
      return this.scanPower(bytes, p + 1, isNegative, whole, fraction, fractionDigits)
    this.value = isNegative && size !== 0 ? -size : size
    return p
  }

  /** The exponent, and the value with it. */
  private scanPower(
    bytes: Uint8Array,
    from: number,
    isNegative: boolean,
    whole: number,
    fraction: number,
    fractionDigits: number,
  ): number {
    const p = this.scanExponent(bytes, from)
    const power = this.exponent - fractionDigits
    if (p < 0 || power < -MOST_POWER || power > MOST_POWER) return NONE
    const digits = whole * POWERS[fractionDigits]! + fraction
    const size = power < 0 ? digits / POWERS[-power]! : digits * POWERS[power]!
    this.value = isNegative && size !== 0 ? -size : size
    return p
  }

  /** A number whose digits do not fit two 32-bit integers, from its first digit or point. */
  private scanLong(bytes: Uint8Array, from: number, isNegative: boolean): number {
    let p = from
    let high = 0
    let low = 0
    let digits = 0
    let point = NONE
    for (let code = bytes[p]!; ; code = bytes[++p]!) {
      if (code === POINT && point === NONE) point = p
      else if (code < ZERO || code > ZERO + 9) break
      // Zeros at the beginning are no digits yet.
      else if (digits === 0 && code === ZERO) continue
      else if (++digits <= MOST_DIGITS) high = high * 10 + code - ZERO
      else low = low * 10 + code - ZERO
    }
    const end = p
    if ((bytes[p]! | LOWER_CASE) === LETTER_E) p = this.scanExponent(bytes, p + 1)
    const exponent = p === end ? 0 : this.exponent
    const power = exponent - (point === NONE ? 0 : end - point - 1)
    if (p < 0 || digits > MOST_LONG || power > 0 || power < -MOST_POWER) return NONE
    const scale = POWERS[Math.max(0, digits - MOST_DIGITS)]!
    const size = longQuotient(high, scale, low, POWERS[-power]!)
    if (Number.isNaN(size)) return NONE
    this.value = isNegative && size !== 0 ? -size : size
    return p
  }

  /** Reads an exponent; answers the position behind it, or −1. */
  private scanExponent(bytes: Uint8Array, from: number): number {
    const isDown = bytes[from] === MINUS
    let p = isDown || bytes[from] === PLUS ? from + 1 : from
    const first = p
    let exponent = 0
    for (let code = bytes[p]!; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!)
      exponent = exponent * 10 + code - ZERO
    if (p === first || p - first > MOST_EXPONENT_DIGITS) return NONE
    this.exponent = isDown ? -exponent : exponent
    return p
  }
}
