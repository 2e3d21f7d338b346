/**
 * Doubles as integers. Every finite double is an integer times a power of two, so all coefficients of a problem are
 * integers in units of one power of two, and sums, differences and comparisons of them are exact.
 */

const bits = new DataView(new ArrayBuffer(8))
const SAFE = 2n ** 53n

/** value = mantissa · 2^exponent with an odd mantissa; 0 has the mantissa 0. */
function decompose(value: number): { mantissa: bigint; exponent: number } {
  if (value === 0) return { mantissa: 0n, exponent: 0 }
  bits.setFloat64(0, value)
  const high = bits.getUint32(0)
  const biased = (high >>> 20) & 0x7ff
  const fraction = (BigInt(high & 0xfffff) << 32n) | BigInt(bits.getUint32(4))
  let mantissa = biased === 0 ? fraction : fraction | (1n << 52n)
  let exponent = Math.max(biased, 1) - 1075
  for (let step = 32; step >= 1; step /= 2)
    while ((mantissa & ((1n << BigInt(step)) - 1n)) === 0n) {
      mantissa >>= BigInt(step)
      exponent += step
    }
  return { mantissa: value < 0 ? -mantissa : mantissa, exponent }
}

/** x · 2^exponent, rounded at most once, also where 2^exponent itself is beyond the doubles. */
function scaled(x: number, exponent: number): number {
  if (exponent < -1000) return x * 2 ** (exponent + 200) * 2 ** -200
  return x * 2 ** exponent
}

/** The greatest e, at most 0, such that all values are integer multiples of 2^e. */
export function commonUnit(lists: readonly ArrayLike<number>[]): number {
  let unit = 0
  for (const list of lists)
    for (let k = 0; k < list.length; k++) {
      const value = list[k]!
      if (!Number.isInteger(unit > -1000 ? value * 2 ** -unit : NaN)) unit = Math.min(unit, decompose(value).exponent)
    }
  return unit
}

/** The value in units of 2^unit, of which it is a multiple. */
export function toInteger(value: number, unit: number): bigint {
  const quick = unit > -1000 ? value * 2 ** -unit : NaN
  if (Number.isSafeInteger(quick)) return BigInt(quick)
  const { mantissa, exponent } = decompose(value)
  return mantissa << BigInt(exponent - unit)
}

const sizeOf = (integer: bigint): bigint => (integer < 0n ? -integer : integer)

/**
 * integer · 2^unit as the nearest double, ties to even; never −0.
 * @throws RangeError when it is beyond the range of doubles
 */
export function toNumber(integer: bigint, unit: number): number {
  const size = sizeOf(integer)
  let value: number
  if (size < SAFE) value = scaled(Number(integer), unit)
  else {
    // The first 64 bits or so and a sticky one for the rest round as the whole does.
    const shift = Math.max(0, 4 * (size.toString(16).length - 16))
    const top = size >> BigInt(shift)
    const sticky = top << BigInt(shift) === size ? 0n : 1n
    value = scaled(Number(top | sticky), unit + shift) * (integer < 0n ? -1 : 1)
  }
  if (!Number.isFinite(value)) throw new RangeError('the reduced coefficients are beyond the range of doubles')
  return value + 0
}

/** Whether `toNumber` gives the value itself. */
export function isExact(integer: bigint, unit: number): boolean {
  const { mantissa, exponent } = decompose(toNumber(integer, unit))
  return exponent >= unit ? mantissa << BigInt(exponent - unit) === integer : mantissa === 0n && integer === 0n
}

/** The greatest double that is at most integer · 2^unit. @throws RangeError when it is beyond the range of doubles */
export function toNumberBelow(integer: bigint, unit: number): number {
  const value = toNumber(integer, unit)
  if (isExact(integer, unit)) return value
  const { mantissa, exponent } = decompose(value)
  const common = Math.min(exponent, unit)
  const isAbove = mantissa << BigInt(exponent - common) > integer << BigInt(unit - common)
  return isAbove ? nextBelow(value) : value
}

function nextBelow(value: number): number {
  if (value === 0) return -Number.MIN_VALUE
  bits.setFloat64(0, value)
  bits.setBigInt64(0, bits.getBigInt64(0) + (value > 0 ? -1n : 1n))
  return bits.getFloat64(0)
}
