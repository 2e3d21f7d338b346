/** Element types of NumPy arrays as doubles: booleans, integers of 1 to 8 bytes, floats of 2, 4 and 8 bytes. */
import { ReadingFault } from './format'
import { LIMITS } from './numbers'

/** How the elements of an array are laid out. */
export interface ElementType {
  readonly kind: 'b' | 'i' | 'u' | 'f' | 'S' | 'U'
  /** Bytes of one element. */
  readonly size: number
  readonly isLittleEndian: boolean
}

/** A number of an array; NaN for an integer that no double equals. */
export type ElementReader = (view: DataView, at: number) => number

const SIZES: Record<string, readonly number[]> = { b: [1], i: [1, 2, 4, 8], u: [1, 2, 4, 8], f: [2, 4, 8] }

const REFUSED: Record<string, string> = {
  O: 'holds Python objects, which are never loaded; convert it with .astype(float)',
  c: 'holds complex numbers; coefficients are real',
  V: 'holds raw bytes or records, no numbers',
  M: 'holds dates, no numbers',
  m: 'holds time spans, no numbers',
  f: 'holds floats of a size that depends on the computer; convert it with .astype(float)',
}

/** @throws ReadingFault for a type that stands for no double, with the reason */
export function elementType(descr: string): ElementType {
  const [, order, kind, digits] = /^([<>|=])([a-zA-Z])(\d*)(?:\[\w+\])?$/.exec(descr) ?? []
  if (kind === undefined) throw new ReadingFault(`the array has the type "${descr.slice(0, 40)}", which is not known`)
  const size = Number(digits)
  const isText = kind === 'S' || kind === 'U'
  if (!isText && !SIZES[kind]?.includes(size)) {
    const reason = REFUSED[kind] ?? 'has elements of a size that is not known'
    throw new ReadingFault(`the array has the type "${descr.slice(0, 40)}": it ${reason}`)
  }
  if (order === '=' || (order === '|' && size > 1 && kind !== 'S'))
    throw new ReadingFault(`the array has the type "${descr}", which leaves the order of bytes open`)
  return { kind: kind as ElementType['kind'], size: kind === 'U' ? 4 * size : size, isLittleEndian: order !== '>' }
}

/** Half precision (IEEE 754-2008, binary16): one sign, five exponent and ten fraction bits. */
function halfOf(bits: number): number {
  const sign = bits & 0x8000 ? -1 : 1
  const exponent = (bits >> 10) & 31
  const fraction = bits & 1023
  if (exponent === 31) return fraction === 0 ? sign * Infinity : Number.NaN
  return exponent === 0 ? sign * fraction * 2 ** -24 : sign * (1024 + fraction) * 2 ** (exponent - 25)
}

const exactly = (integer: bigint): number => (BigInt(Number(integer)) === integer ? Number(integer) : Number.NaN)

/** Halves of integers of eight bytes: where the upper one is small, a double holds both, without the cost of a BigInt. */
const SMALL_HIGH = 2 ** 21
const HALF = 2 ** 32

function longReader(little: boolean, isSigned: boolean): ElementReader {
  const [high, low] = little ? [4, 0] : [0, 4]
  return (view, at) => {
    const upper = isSigned ? view.getInt32(at + high, little) : view.getUint32(at + high, little)
    if (upper < SMALL_HIGH && upper >= -SMALL_HIGH) return upper * HALF + view.getUint32(at + low, little)
    return exactly(isSigned ? view.getBigInt64(at, little) : view.getBigUint64(at, little))
  }
}

const READERS: Record<string, (little: boolean) => ElementReader> = {
  b1: () => (view, at) => (view.getUint8(at) <= 1 ? view.getUint8(at) : Number.NaN),
  i1: () => (view, at) => view.getInt8(at),
  i2: (little) => (view, at) => view.getInt16(at, little),
  i4: (little) => (view, at) => view.getInt32(at, little),
  i8: (little) => longReader(little, true),
  u1: () => (view, at) => view.getUint8(at),
  u2: (little) => (view, at) => view.getUint16(at, little),
  u4: (little) => (view, at) => view.getUint32(at, little),
  u8: (little) => longReader(little, false),
  f2: (little) => (view, at) => halfOf(view.getUint16(at, little)),
  f4: (little) => (view, at) => view.getFloat32(at, little),
  f8: (little) => (view, at) => view.getFloat64(at, little),
}

/** @throws ReadingFault for arrays of text */
export function elementReader({ kind, size, isLittleEndian }: ElementType): ElementReader {
  const reader = READERS[`${kind}${size}`]
  if (!reader) throw new ReadingFault('the array holds text, no numbers')
  return reader(isLittleEndian)
}

/** Whether a number can be a coefficient, as in the text formats. */
export const isCoefficient = (value: number): boolean => {
  const size = Math.abs(value)
  return value === 0 || (size >= LIMITS.least && size <= LIMITS.greatest)
}

/** Why the element cannot be a coefficient, when `isCoefficient` says so. */
export function elementFault({ kind, isLittleEndian }: ElementType, view: DataView, at: number, value: number): string {
  if (kind === 'b') return `the byte ${view.getUint8(at)} is neither False nor True`
  if (kind === 'i' || kind === 'u') {
    const integer = kind === 'i' ? view.getBigInt64(at, isLittleEndian) : view.getBigUint64(at, isLittleEndian)
    return `the integer ${integer} has more digits than a double holds exactly`
  }
  if (!Number.isFinite(value)) return `the value ${value} is not a finite number`
  return `the value ${value} is too ${Math.abs(value) > 1 ? 'large' : 'close to zero'}`
}
