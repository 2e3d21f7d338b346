import { ReadingFault } from './format'
import { uint16, uint32 } from './little-endian'

/** Layout of ZIP archives (PKWARE, APPNOTE.TXT): signatures, sizes of records without names, values of fields. */
const ZIP = {
  endSignature: 0x06054b50,
  endSize: 22,
  maxComment: 65_535,
  directorySignature: 0x02014b50,
  directorySize: 46,
  localSignature: 0x04034b50,
  localSize: 30,
  encrypted: 1,
  stored: 0,
  deflated: 8,
  /** Stand in a field whose value is in a ZIP64 record instead. */
  elsewhere16: 0xffff,
  elsewhere32: 0xffffffff,
}

/** One file of an archive, as the directory describes it. */
export interface ZipEntry {
  readonly name: string
  readonly flags: number
  readonly method: number
  /** CRC-32 of the contents. */
  readonly sum: number
  /** Bytes in the archive, and unpacked. */
  readonly packed: number
  readonly size: number
  /** Where its own header begins. */
  readonly at: number
}

/** Where the end record of the archive begins. */
function endRecord(bytes: Uint8Array): number {
  const last = bytes.length - ZIP.endSize
  for (let at = last; at >= Math.max(0, last - ZIP.maxComment); at--)
    if (bytes[at] === 0x50 && uint32(bytes, at) === ZIP.endSignature) return at
  throw new ReadingFault('the archive is cut short: its directory is missing')
}

/** The archive's directory, as its end record points to it. */
export function zipDirectory(bytes: Uint8Array): ZipEntry[] {
  const end = endRecord(bytes)
  const count = uint16(bytes, end + 10)
  let at = uint32(bytes, end + 16)
  if (count === ZIP.elsewhere16 || at === ZIP.elsewhere32)
    throw new ReadingFault('the archive is of the kind ZIP64, for sizes beyond 4 GiB, which is not read here')
  const names = new TextDecoder()
  const entries: ZipEntry[] = []
  for (let k = 0; k < count; k++) {
    if (at + ZIP.directorySize > end || uint32(bytes, at) !== ZIP.directorySignature)
      throw new ReadingFault(`the archive is damaged: entry ${k + 1} of its directory cannot be read`)
    const nameEnd = at + ZIP.directorySize + uint16(bytes, at + 28)
    entries.push({
      name: names.decode(bytes.subarray(at + ZIP.directorySize, nameEnd)),
      flags: uint16(bytes, at + 8),
      method: uint16(bytes, at + 10),
      sum: uint32(bytes, at + 16),
      packed: uint32(bytes, at + 20),
      size: uint32(bytes, at + 24),
      at: uint32(bytes, at + 42),
    })
    at = nameEnd + uint16(bytes, at + 30) + uint16(bytes, at + 32)
  }
  return entries
}

/** Whether the entry is packed by DEFLATE, rather than stored as it is. */
export const isDeflated = ({ method }: ZipEntry): boolean => method === ZIP.deflated

/** Why an entry cannot be read, or null. */
export function entryFault(bytes: Uint8Array, { flags, method, packed, size, at }: ZipEntry): string | null {
  if (flags & ZIP.encrypted) return 'is encrypted'
  if (method !== ZIP.stored && method !== ZIP.deflated) return `is packed by method ${method}, not by DEFLATE`
  if (packed === ZIP.elsewhere32 || size === ZIP.elsewhere32 || at === ZIP.elsewhere32)
    return 'is of the kind ZIP64, for sizes beyond 4 GiB, which is not read here'
  const isInside = at + ZIP.localSize + packed <= bytes.length
  return isInside && uint32(bytes, at) === ZIP.localSignature ? null : 'is not where the directory says'
}

/** The packed bytes of an entry without faults. */
export function packedBytes(bytes: Uint8Array, { at, packed }: ZipEntry): Uint8Array {
  const from = at + ZIP.localSize + uint16(bytes, at + 26) + uint16(bytes, at + 28)
  return bytes.subarray(from, from + packed)
}
