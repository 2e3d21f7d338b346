/**
 * Containers of files: gzip (RFC 1952) and ZIP archives. The one file of the engine that knows the package for DEFLATE.
 * Every size is bounded before memory is taken, and checksums are verified, which the package leaves to its caller.
 */
import { Gunzip, gzipSync, inflateSync, zipSync } from 'fflate'
import { crc32 } from './checksum'

/** Why a container cannot be opened; the message is meant for the person who sent it. */
export class ArchiveError extends Error {
  override readonly name = 'ArchiveError'
}

/** How large the contents of a container may be. */
export interface ArchiveLimits {
  /** Bytes that may come out. */
  readonly maxBytes: number
  /** Bytes out for each byte in, allowed beyond `freeBytes`: what grows faster was made to fill the memory. */
  readonly maxRatio: number
  /** Bytes that may come out whatever the ratio. */
  readonly freeBytes: number
}

export const ARCHIVE_LIMITS: ArchiveLimits = { maxBytes: 512 * 2 ** 20, maxRatio: 200, freeBytes: 64 * 2 ** 20 }

const SIZES = {
  /** DEFLATE grows at most about a thousandfold, so one piece comes out as at most about 32 MiB. */
  piece: 2 ** 15,
  /** Beyond any header with a sensible file name in it. */
  header: 2 ** 17,
  trailer: 8,
}

const mebibytes = (bytes: number): string => `${Math.floor(bytes / 2 ** 20)} MiB`

/** @throws ArchiveError when `out` bytes made of `taken` are more than the limits allow */
function checkGrowth(out: number, taken: number, { maxBytes, maxRatio, freeBytes }: ArchiveLimits): void {
  if (out > maxBytes)
    throw new ArchiveError(`decompressed it is larger than the ${mebibytes(maxBytes)} that are taken here`)
  if (out > freeBytes && out > taken * maxRatio)
    throw new ArchiveError(`it grows more than ${maxRatio}-fold when decompressed, beyond ${mebibytes(freeBytes)}`)
}

/** Whether the bytes begin as a gzip file does. */
export const isGzip = (head: Uint8Array): boolean => head[0] === 0x1f && head[1] === 0x8b

/** Whether the bytes begin as a ZIP archive does, be it an empty one. */
export const isZip = (head: Uint8Array): boolean =>
  head[0] === 0x50 && head[1] === 0x4b && ((head[2] === 3 && head[3] === 4) || (head[2] === 5 && head[3] === 6))

const uint32 = (bytes: Uint8Array, at: number): number =>
  new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(at, true)

const uint16 = (bytes: Uint8Array, at: number): number => bytes[at]! | (bytes[at + 1]! << 8)

/** One gzip file of one or more members, opened piece by piece. */
class GzipReader {
  private readonly stream = new Gunzip()
  private out: Uint8Array[] = []
  private taken = 0
  private given = 0
  /** Bytes that went in since the stream last said that it was past a header. */
  private silent = 0
  /** The latest bytes that went in: the trailer of a member is looked up there. */
  private recent = new Uint8Array(0)
  private sum = 0
  private size = 0

  constructor(private readonly limits: ArchiveLimits) {
    this.stream.ondata = (bytes) => this.take(bytes)
    this.stream.onmember = (offset) => this.endMember(offset)
  }

  /** Puts one piece in and hands out what came of it; `isLast` for the end of the file. */
  push(piece: Uint8Array, isLast: boolean): Uint8Array[] {
    this.out = []
    this.taken += piece.length
    this.silent += piece.length
    this.remember(piece)
    try {
      this.stream.push(piece, isLast)
    } catch (error) {
      throw error instanceof ArchiveError ? error : new ArchiveError(faultOf(error, isLast))
    }
    if (this.silent > SIZES.header) throw new ArchiveError('its gzip header is too long')
    if (isLast) this.endMember(this.taken)
    return this.out
  }

  private take(bytes: Uint8Array): void {
    this.silent = 0
    this.given += bytes.length
    checkGrowth(this.given, this.taken, this.limits)
    this.sum = crc32(bytes, this.sum)
    this.size = (this.size + bytes.length) >>> 0
    if (bytes.length > 0) this.out.push(bytes)
  }

  private remember(piece: Uint8Array): void {
    const kept = this.recent.subarray(Math.max(0, this.recent.length - SIZES.header - SIZES.trailer))
    const joined = new Uint8Array(kept.length + piece.length)
    joined.set(kept)
    joined.set(piece, kept.length)
    this.recent = joined
  }

  /** Checks the member that ends before the given place of the file against its trailer. */
  private endMember(offset: number): void {
    const at = this.recent.length - (this.taken - offset) - SIZES.trailer
    if (at < 0) throw new ArchiveError('it is cut short')
    if (uint32(this.recent, at) !== this.sum || uint32(this.recent, at + 4) !== this.size)
      throw new ArchiveError('it is damaged or cut short: the gzip checksum does not match')
    this.sum = 0
    this.size = 0
  }
}

/** What the package's error means to the one who sent the file. */
function faultOf(error: unknown, isLast: boolean): string {
  const reason = error instanceof Error ? error.message : String(error)
  return isLast && /EOF/.test(reason) ? 'it is cut short' : `its compressed data are damaged (${reason})`
}

/** The bytes in pieces of a size that bounds what one of them can grow to. */
function* pieces(chunks: Iterable<Uint8Array>): Generator<Uint8Array> {
  for (const chunk of chunks)
    for (let p = 0; p < chunk.length; p += SIZES.piece) yield chunk.subarray(p, p + SIZES.piece)
}

/**
 * Opens a gzip file of one or more members as its bytes arrive; where the chunks are cut makes no difference.
 * Memory is some tens of MiB whatever the size.
 * @throws ArchiveError while iterating, when the file is damaged, cut short, followed by other bytes, or too large
 */
export function* gunzip(
  chunks: Iterable<Uint8Array>,
  limits: ArchiveLimits = ARCHIVE_LIMITS,
): Generator<Uint8Array, void, undefined> {
  const reader = new GzipReader(limits)
  let held: Uint8Array | null = null
  for (const piece of pieces(chunks)) {
    if (held) yield* reader.push(held, false)
    held = piece
  }
  if (!held) throw new ArchiveError('it is empty')
  yield* reader.push(held, true)
}

/** The bytes as a gzip file of one member, without a time or a name: the same bytes make the same file. */
export const gzip = (bytes: Uint8Array): Uint8Array => gzipSync(bytes, { mtime: 0 })

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

interface ZipEntry {
  readonly name: string
  readonly flags: number
  readonly method: number
  readonly sum: number
  readonly packed: number
  readonly size: number
  readonly at: number
}

/** Where the end record of the archive begins. */
function endRecord(bytes: Uint8Array): number {
  const last = bytes.length - ZIP.endSize
  for (let at = last; at >= Math.max(0, last - ZIP.maxComment); at--)
    if (bytes[at] === 0x50 && uint32(bytes, at) === ZIP.endSignature) return at
  throw new ArchiveError('the archive is cut short: its directory is missing')
}

/** The archive's directory, as its end record points to it. */
function zipDirectory(bytes: Uint8Array): ZipEntry[] {
  const end = endRecord(bytes)
  const count = uint16(bytes, end + 10)
  let at = uint32(bytes, end + 16)
  if (count === ZIP.elsewhere16 || at === ZIP.elsewhere32)
    throw new ArchiveError('the archive is of the kind ZIP64, for sizes beyond 4 GiB, which is not read here')
  const names = new TextDecoder()
  const entries: ZipEntry[] = []
  for (let k = 0; k < count; k++) {
    if (at + ZIP.directorySize > end || uint32(bytes, at) !== ZIP.directorySignature)
      throw new ArchiveError(`the archive is damaged: entry ${k + 1} of its directory cannot be read`)
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

/** What keeps an entry from being read, or null. */
function entryFault({ flags, method, packed, size, at }: ZipEntry, end: number): string | null {
  if (flags & ZIP.encrypted) return 'is encrypted'
  if (method !== ZIP.stored && method !== ZIP.deflated) return `is packed by method ${method}, not by DEFLATE`
  if (packed === ZIP.elsewhere32 || size === ZIP.elsewhere32 || at === ZIP.elsewhere32)
    return 'is of the kind ZIP64, for sizes beyond 4 GiB, which is not read here'
  if (at + ZIP.localSize + packed > end) return 'lies outside the archive'
  return null
}

/** The entry's contents, checked against the size and the checksum of the directory. */
function unpack(bytes: Uint8Array, entry: ZipEntry): Uint8Array {
  const fault = entryFault(entry, bytes.length)
  if (fault) throw new ArchiveError(`"${entry.name}" in the archive ${fault}`)
  const damaged = new ArchiveError(`"${entry.name}" in the archive is damaged`)
  if (uint32(bytes, entry.at) !== ZIP.localSignature) throw damaged
  const from = entry.at + ZIP.localSize + uint16(bytes, entry.at + 26) + uint16(bytes, entry.at + 28)
  const packed = bytes.subarray(from, from + entry.packed)
  let contents = packed
  if (entry.method === ZIP.deflated) {
    try {
      contents = inflateSync(packed, { out: new Uint8Array(entry.size) })
    } catch {
      throw damaged
    }
  }
  if (contents.length !== entry.size || crc32(contents) !== entry.sum) throw damaged
  return contents
}

/**
 * Reads the entries of a ZIP archive whose names are wanted; all others are left alone, whatever their names say.
 * @returns contents by name
 * @throws ArchiveError when the archive is damaged, encrypted or ZIP64, a wanted name stands in it twice, or the wanted
 *   entries together are larger than the limits allow
 */
export function readZip(
  bytes: Uint8Array,
  isWanted: (name: string) => boolean,
  limits: ArchiveLimits = ARCHIVE_LIMITS,
): Map<string, Uint8Array> {
  const wanted = zipDirectory(bytes).filter(({ name }) => isWanted(name))
  const names = new Set(wanted.map(({ name }) => name))
  const twice = wanted.find(({ name }) => !names.delete(name))
  if (twice) throw new ArchiveError(`"${twice.name}" stands in the archive twice`)
  const size = wanted.reduce((sum, entry) => sum + entry.size, 0)
  if (wanted.every((entry) => !entryFault(entry, bytes.length))) checkGrowth(size, bytes.length, limits)
  return new Map(wanted.map((entry) => [entry.name, unpack(bytes, entry)]))
}

/** A ZIP archive of the contents by name, without times: the same contents make the same archive. */
export const writeZip = (contents: ReadonlyMap<string, Uint8Array>): Uint8Array =>
  zipSync(Object.fromEntries(contents), { mtime: '1980-01-01T00:00:00' })
