/**
 * Heads of NumPy array files, versions 1.0 to 3.0 (NumPy Enhancement Proposal 1, "A simple file format for NumPy
 * arrays"): magic, version, length, and a dictionary written as Python text. It is parsed here, never evaluated.
 */
import type { ByteSource } from './byte-source'
import { ReadingFault } from './format'
import { uint16, uint32 } from './little-endian'

const MAGIC = [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59] as const
const MAX_HEADER = 65_536

export interface NpyHeader {
  /** Element type as NumPy writes it, such as `<f8`. */
  readonly descr: string
  /** Whether the first index runs fastest. */
  readonly fortranOrder: boolean
  readonly shape: readonly number[]
}

/** Whether the bytes begin as a NumPy array file does. */
export const isNpy = (head: Uint8Array): boolean => MAGIC.every((code, place) => head[place] === code)

type Literal = string | boolean | number[]

/** A value of the head's dictionary: a quoted text, True or False, or a tuple of whole numbers. */
const TOKEN = /\s*(?:'([^'\\]*)'|"([^"\\]*)"|(True|False)|\(([\d\s,L]*)\))\s*/y
const KEY = /\s*(?:'(\w+)'|"(\w+)")\s*:/y

function literalOf([, single, double, truth, tuple]: RegExpExecArray): Literal {
  if (truth !== undefined) return truth === 'True'
  if (tuple === undefined) return single ?? double ?? ''
  const items = tuple.split(',').map((item) => item.trim())
  if (items.at(-1) === '') items.pop()
  // Python 2 wrote long integers with an L behind them.
  return items.map((item) => (/^\d{1,15}L?$/.test(item) ? Number.parseInt(item, 10) : Number.NaN))
}

/** The dictionary `{'key': value, …}`, or null when it is none of that shape. */
function dictionaryOf(text: string): Map<string, Literal> | null {
  const body = /^\s*\{([\s\S]*)\}\s*$/.exec(text)?.[1]
  if (body === undefined) return null
  const entries = new Map<string, Literal>()
  for (let place = 0; body.slice(place).trim() !== '';) {
    KEY.lastIndex = place
    const key = KEY.exec(body)
    TOKEN.lastIndex = KEY.lastIndex
    const value = key && TOKEN.exec(body)
    if (!value) return null
    const name = key[1] ?? key[2]!
    place = TOKEN.lastIndex
    const hasComma = body[place] === ','
    if (entries.has(name) || !(hasComma || place === body.length)) return null
    entries.set(name, literalOf(value))
    if (hasComma) place++
  }
  return entries
}

function headerOf(text: string): NpyHeader {
  // Types of records are lists of pairs, which the pattern of values does not know.
  if (/['"]descr['"]\s*:\s*\[/.test(text))
    throw new ReadingFault('the array has a structured type (records); a matrix of plain numbers is needed')
  const entries = dictionaryOf(text)
  const descr = entries?.get('descr')
  const fortranOrder = entries?.get('fortran_order')
  const shape = entries?.get('shape')
  if (entries?.size !== 3 || typeof descr !== 'string' || typeof fortranOrder !== 'boolean' || !Array.isArray(shape))
    throw new ReadingFault('the head of the NumPy file does not state type, order and shape')
  if (!shape.every(Number.isSafeInteger)) throw new ReadingFault('the head of the NumPy file states no valid shape')
  return { descr, fortranOrder, shape }
}

/**
 * Reads the head of an array file; the elements come next.
 * @throws ReadingFault when the bytes are no such head
 */
export function readNpyHeader(source: ByteSource): NpyHeader {
  if (!isNpy(source.take(MAGIC.length))) throw new ReadingFault('the file is no NumPy array: its first bytes differ')
  const [major, minor] = source.take(2)
  if (major! < 1 || major! > 3 || minor !== 0)
    throw new ReadingFault(`the NumPy file has the version ${major}.${minor}; 1.0, 2.0 and 3.0 are read`)
  const length = major === 1 ? uint16(source.take(2), 0) : uint32(source.take(4), 0)
  if (length > MAX_HEADER) throw new ReadingFault(`the head of the NumPy file is longer than ${MAX_HEADER} bytes`)
  return headerOf(new TextDecoder(major === 3 ? 'utf-8' : 'latin1').decode(source.take(length)))
}

const ALIGNMENT = 64
const SPACE = 0x20
const LINE_FEED = 0x0a

/** The head of an array in C order, of version 1.0, padded so that the elements begin at a multiple of 64 bytes. */
export function writeNpyHeader(descr: string, shape: readonly number[]): Uint8Array {
  const sizes = shape.length === 1 ? `${shape[0]},` : shape.join(', ')
  const text = `{'descr': '${descr}', 'fortran_order': False, 'shape': (${sizes}), }`
  const before = MAGIC.length + 4
  const length = Math.ceil((before + text.length + 1) / ALIGNMENT) * ALIGNMENT - before
  const head = new Uint8Array(before + length).fill(SPACE)
  head.set([...MAGIC, 1, 0, length & 0xff, length >> 8])
  head.set(new TextEncoder().encode(text), before)
  head[head.length - 1] = LINE_FEED
  return head
}
