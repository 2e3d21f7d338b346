/**
 * Several typed arrays and strings in one byte array: how coefficients, chains, samples and lattice geometry are stored
 * and sent. Layout: uint32 header length (little-endian), header JSON (UTF-8), padding to 8, then each array 8-aligned.
 */
const KINDS = { Float64Array, Float32Array, Uint32Array, Int32Array, Uint16Array, Uint8Array, Int8Array } as const
type Kind = keyof typeof KINDS
export type PackedArray = Float64Array | Float32Array | Uint32Array | Int32Array | Uint16Array | Uint8Array | Int8Array

interface Entry {
  name: string
  kind: Kind
  length: number
}

export interface Unpacked {
  /** JSON that travelled with the arrays. */
  meta: Record<string, unknown>
  arrays: Record<string, PackedArray>
}

const align = (at: number): number => (at + 7) & ~7

const kindOf = (array: PackedArray): Kind => {
  const kind = (Object.keys(KINDS) as Kind[]).find((name) => array instanceof KINDS[name])
  if (!kind) throw new TypeError('only plain typed arrays can be packed')
  return kind
}

export function packArrays(
  arrays: Record<string, PackedArray>,
  meta: Record<string, unknown> = {},
): Uint8Array<ArrayBuffer> {
  const entries: Entry[] = Object.entries(arrays).map(([name, array]) => ({
    name,
    kind: kindOf(array),
    length: array.length,
  }))
  const header = new TextEncoder().encode(JSON.stringify({ meta, entries }))
  let total = align(4 + header.length)
  for (const array of Object.values(arrays)) total = align(total + array.byteLength)
  const bytes = new Uint8Array(total)
  new DataView(bytes.buffer).setUint32(0, header.length, true)
  bytes.set(header, 4)
  let at = align(4 + header.length)
  for (const array of Object.values(arrays)) {
    bytes.set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), at)
    at = align(at + array.byteLength)
  }
  return bytes
}

/** @throws RangeError when the bytes are cut short or name an unknown kind of array */
export function unpackArrays(bytes: Uint8Array): Unpacked {
  // Typed arrays need aligned offsets; a view into a larger buffer may not be.
  const own = bytes.byteOffset % 8 === 0 ? bytes : bytes.slice()
  const headerLength = new DataView(own.buffer, own.byteOffset, own.byteLength).getUint32(0, true)
  const header = JSON.parse(new TextDecoder().decode(own.subarray(4, 4 + headerLength))) as {
    meta: Record<string, unknown>
    entries: Entry[]
  }
  const arrays: Record<string, PackedArray> = {}
  let at = align(4 + headerLength)
  for (const { name, kind, length } of header.entries) {
    const Kind = KINDS[kind]
    if (!Kind) throw new RangeError(`packed array ${name} is of unknown kind ${kind}`)
    if (at + length * Kind.BYTES_PER_ELEMENT > own.byteLength) throw new RangeError(`packed array ${name} is cut short`)
    arrays[name] = new Kind(own.buffer as ArrayBuffer, own.byteOffset + at, length)
    at = align(at + length * Kind.BYTES_PER_ELEMENT)
  }
  return { meta: header.meta, arrays }
}
