/** Whole NumPy arrays in memory, as the entries of an archive are. */
import { ByteSource } from './byte-source'
import { ReadingFault } from './format'
import { readNpyHeader, writeNpyHeader } from './npy-header'
import { elementFault, elementReader, elementType, isCoefficient, type ElementType } from './npy-types'

/** An array of at most one dimension, or of two in C order; `count` elements. */
export class NpyArray {
  private readonly view: DataView

  constructor(
    readonly name: string,
    readonly type: ElementType,
    readonly shape: readonly number[],
    readonly count: number,
    bytes: Uint8Array,
  ) {
    this.view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  }

  /** All elements as coefficients. @throws ReadingFault naming the first that can be none */
  coefficients(): Float64Array {
    const read = elementReader(this.type)
    const values = new Float64Array(this.count)
    for (let k = 0; k < this.count; k++) {
      const at = k * this.type.size
      values[k] = read(this.view, at)
      if (!isCoefficient(values[k]!))
        throw new ReadingFault(`${this.name}[${k}]: ${elementFault(this.type, this.view, at, values[k]!)}`)
    }
    return values
  }

  /** All elements as whole numbers from 0 to below `bound`. @throws ReadingFault naming the first that is not */
  indices(bound: number): Uint32Array {
    if (this.type.kind !== 'i' && this.type.kind !== 'u')
      throw new ReadingFault(`${this.name} in the archive holds no integers`)
    const read = elementReader(this.type)
    const values = new Uint32Array(this.count)
    for (let k = 0; k < this.count; k++) {
      const value = read(this.view, k * this.type.size)
      if (!(value >= 0 && value < bound))
        throw new ReadingFault(`${this.name}[${k}] is ${value}, outside 0 … ${bound - 1}`)
      values[k] = value
    }
    return values
  }

  /** All elements as text without the zeros that fill them up. @throws ReadingFault for an array of no text */
  texts(): string[] {
    const { kind, size } = this.type
    if (kind !== 'S' && kind !== 'U') throw new ReadingFault(`${this.name} in the archive holds no text`)
    return Array.from({ length: this.count }, (_, k) => {
      const text = kind === 'S' ? this.bytesAt(k * size, size) : this.wideAt(k * size, size)
      return text.replace(/\0+$/, '')
    })
  }

  private bytesAt(at: number, size: number): string {
    return new TextDecoder().decode(new Uint8Array(this.view.buffer, this.view.byteOffset + at, size))
  }

  private wideAt(at: number, size: number): string {
    let text = ''
    for (let p = at; p < at + size; p += 4) {
      const code = this.view.getUint32(p, this.type.isLittleEndian)
      if (code > 0x10ffff) throw new ReadingFault(`${this.name} in the archive holds a code that is no character`)
      text += String.fromCodePoint(code)
    }
    return text
  }
}

/** @throws ReadingFault when the bytes are no array, or not exactly one */
export function readNpyArray(name: string, bytes: Uint8Array): NpyArray {
  const source = new ByteSource([bytes])
  try {
    const { descr, fortranOrder, shape } = readNpyHeader(source)
    if (fortranOrder && shape.filter((length) => length > 1).length > 1)
      throw new ReadingFault('an array in Fortran order is not expected here')
    const type = elementType(descr)
    const count = shape.reduce((product, length) => product * length, 1)
    const data = source.take(Math.min(count * type.size, bytes.length + 1))
    if (source.hasMore()) throw new ReadingFault('more bytes follow the array')
    return new NpyArray(name, type, shape, count, data)
  } catch (error) {
    throw error instanceof ReadingFault ? new ReadingFault(`${name} in the archive: ${error.message}`) : error
  }
}

function joined(head: Uint8Array, data: Uint8Array): Uint8Array {
  const file = new Uint8Array(head.length + data.length)
  file.set(head)
  file.set(data, head.length)
  return file
}

/** Doubles as an array file, lowest byte first. */
export function writeDoubles(values: Float64Array, shape: readonly number[] = [values.length]): Uint8Array {
  const data = new DataView(new ArrayBuffer(8 * values.length))
  values.forEach((value, k) => data.setFloat64(8 * k, value, true))
  return joined(writeNpyHeader('<f8', shape), new Uint8Array(data.buffer))
}

/** Whole numbers below 2³¹ as an array file of 32-bit integers, lowest byte first. */
export function writeIntegers(values: ArrayLike<number>): Uint8Array {
  const data = new DataView(new ArrayBuffer(4 * values.length))
  for (let k = 0; k < values.length; k++) data.setInt32(4 * k, values[k]!, true)
  return joined(writeNpyHeader('<i4', [values.length]), new Uint8Array(data.buffer))
}

/** Whole numbers from −128 to 127 as an array file of single bytes. */
export const writeBytes = (values: Int8Array, shape: readonly number[] = [values.length]): Uint8Array =>
  joined(writeNpyHeader('|i1', shape), new Uint8Array(values.buffer, values.byteOffset, values.length))

/** One text of ASCII characters as an array file of bytes without dimensions. */
export const writeWord = (word: string): Uint8Array =>
  joined(writeNpyHeader(`|S${word.length}`, []), new TextEncoder().encode(word))

/** Texts as an array file of four-byte characters, filled up to the longest. */
export function writeTexts(texts: readonly string[], shape: readonly number[] = [texts.length]): Uint8Array {
  const codes = texts.map((text) => Array.from(text, (character) => character.codePointAt(0)!))
  const longest = codes.reduce((length, text) => Math.max(length, text.length), 1)
  const data = new DataView(new ArrayBuffer(4 * longest * texts.length))
  codes.forEach((text, k) => text.forEach((code, p) => data.setUint32(4 * (k * longest + p), code, true)))
  return joined(writeNpyHeader(`<U${longest}`, shape), new Uint8Array(data.buffer))
}
