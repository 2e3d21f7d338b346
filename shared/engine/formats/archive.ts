/**
 * Containers of files: gzip (RFC 1952) and ZIP archives. The one file of the engine that knows the package for DEFLATE.
 * Every size is bounded before memory is taken, and checksums are verified, which the package leaves to its caller.
 */
import { Gunzip, gzipSync, Inflate, inflateSync, zipSync } from 'fflate'
import { ARCHIVE_LIMITS, checkGrowth, type ArchiveLimits } from './archive-limits'
import { crc32 } from './checksum'
import { ReadingFault } from './format'
import { uint32 } from './little-endian'
import { entryFault, isDeflated, packedBytes, zipDirectory, type ZipEntry } from './zip-directory'

const SIZES = {
  /** DEFLATE grows at most about a thousandfold, so one piece comes out as at most about 32 MiB. */
  piece: 2 ** 15,
  /** Beyond any header with a sensible file name in it. */
  header: 2 ** 17,
  trailer: 8,
}

/** Every member costs time of its own; files in blocks of 64 KiB stay below this up to the largest size taken. */
const MAX_MEMBERS = 10_000

/** Whether the bytes begin as a gzip file does. */
export const isGzip = (head: Uint8Array): boolean => head[0] === 0x1f && head[1] === 0x8b

/** Whether the bytes begin as a ZIP archive does, be it an empty one. */
export const isZip = (head: Uint8Array): boolean =>
  head[0] === 0x50 && head[1] === 0x4b && ((head[2] === 3 && head[3] === 4) || (head[2] === 5 && head[3] === 6))

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
  private members = 0
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
      throw error instanceof ReadingFault ? error : new ReadingFault(faultOf(error, isLast))
    }
    if (this.silent > SIZES.header) throw new ReadingFault('the gzip file is damaged: its header is too long')
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
    if (at < 0) throw new ReadingFault('the gzip file is cut short')
    if (uint32(this.recent, at) !== this.sum || uint32(this.recent, at + 4) !== this.size)
      throw new ReadingFault('the gzip file is damaged or cut short: its checksum does not match')
    if (++this.members > MAX_MEMBERS) throw new ReadingFault(`the gzip file has more than ${MAX_MEMBERS} parts`)
    this.sum = 0
    this.size = 0
  }
}

/** What the package's error means to the one who sent the file. */
function faultOf(error: unknown, isLast: boolean): string {
  const reason = error instanceof Error ? error.message : String(error)
  return isLast && /EOF/.test(reason) ? 'the gzip file is cut short' : `the gzip file is damaged (${reason})`
}

/** The bytes in pieces of one size, which bounds what a piece can grow to, and spares the work that each one costs. */
function* pieces(chunks: Iterable<Uint8Array>): Generator<Uint8Array> {
  let piece = new Uint8Array(SIZES.piece)
  let filled = 0
  for (const chunk of chunks)
    for (let p = 0; p < chunk.length;) {
      const part = chunk.subarray(p, p + SIZES.piece - filled)
      piece.set(part, filled)
      p += part.length
      filled += part.length
      if (filled < SIZES.piece) continue
      yield piece
      piece = new Uint8Array(SIZES.piece)
      filled = 0
    }
  if (filled > 0) yield piece.subarray(0, filled)
}

/**
 * Opens a gzip file of one or more members as its bytes arrive; where the chunks are cut makes no difference.
 * Memory is some tens of MiB whatever the size.
 * @throws ReadingFault while iterating, when the file is damaged, cut short, followed by other bytes, or too large
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
  if (!held) throw new ReadingFault('the gzip file is empty')
  yield* reader.push(held, true)
}

/** The bytes as a gzip file of one member, without a time or a name: the same bytes make the same file. */
export const gzip = (bytes: Uint8Array): Uint8Array => gzipSync(bytes, { mtime: 0 })

/** The entry's contents, checked against the size and the checksum of the directory. */
function unpack(bytes: Uint8Array, entry: ZipEntry): Uint8Array {
  const packed = packedBytes(bytes, entry)
  let contents: Uint8Array | null = packed
  if (isDeflated(entry)) {
    try {
      contents = inflateSync(packed, { out: new Uint8Array(entry.size) })
    } catch {
      contents = null
    }
  }
  if (contents?.length !== entry.size || crc32(contents) !== entry.sum)
    throw new ReadingFault(`"${entry.name}" in the archive is damaged`)
  return contents
}

/**
 * Reads the entries of a ZIP archive whose names are wanted; all others are left alone, whatever their names say.
 * @returns contents by name
 * @throws ReadingFault when the archive is damaged, encrypted or ZIP64, a wanted name stands in it twice, or the wanted
 *   entries together are larger than the limits allow
 */
export function readZip(
  bytes: Uint8Array,
  isWanted: (name: string) => boolean,
  limits: ArchiveLimits = ARCHIVE_LIMITS,
): Map<string, Uint8Array> {
  const wanted = zipDirectory(bytes).filter(({ name }) => isWanted(name))
  const names = new Set<string>()
  let size = 0
  for (const entry of wanted) {
    const fault = names.has(entry.name) ? 'stands in it twice' : entryFault(bytes, entry)
    if (fault) throw new ReadingFault(`"${entry.name}" in the archive ${fault}`)
    names.add(entry.name)
    checkGrowth((size += entry.size), bytes.length, limits)
  }
  return new Map(wanted.map((entry) => [entry.name, unpack(bytes, entry)]))
}

/**
 * The contents of one entry of a ZIP archive as they are unpacked, for entries too large to hold whole; null when the
 * archive has none of that name.
 * @throws ReadingFault, also while iterating, when the entry is damaged or larger than the limits allow
 */
export function streamZipEntry(
  bytes: Uint8Array,
  name: string,
  limits: ArchiveLimits,
): Generator<Uint8Array, void, undefined> | null {
  const entry = zipDirectory(bytes).find((candidate) => candidate.name === name)
  if (!entry) return null
  const fault = entryFault(bytes, entry)
  if (fault) throw new ReadingFault(`"${name}" in the archive ${fault}`)
  checkGrowth(entry.size, bytes.length, limits)
  return checkedPieces(bytes, entry)
}

/** Pieces of an entry, its size and sum compared with the directory at the end. */
function* checkedPieces(bytes: Uint8Array, entry: ZipEntry): Generator<Uint8Array, void, undefined> {
  const damaged = new ReadingFault(`"${entry.name}" in the archive is damaged`)
  const packed = packedBytes(bytes, entry)
  let sum = 0
  let size = 0
  for (const piece of isDeflated(entry) ? inflatedPieces(packed, damaged) : pieces([packed])) {
    sum = crc32(piece, sum)
    size += piece.length
    if (size > entry.size) throw damaged
    yield piece
  }
  if (size !== entry.size || sum !== entry.sum) throw damaged
}

function* inflatedPieces(packed: Uint8Array, damaged: ReadingFault): Generator<Uint8Array, void, undefined> {
  let out: Uint8Array[] = []
  const stream = new Inflate((bytes) => out.push(bytes))
  for (let at = 0; at < packed.length; at += SIZES.piece) {
    const end = Math.min(packed.length, at + SIZES.piece)
    try {
      stream.push(packed.subarray(at, end), end === packed.length)
    } catch {
      throw damaged
    }
    yield* out
    out = []
  }
}

/** A ZIP archive of the contents by name, without times: the same contents make the same archive. */
export const writeZip = (contents: ReadonlyMap<string, Uint8Array>): Uint8Array =>
  zipSync(Object.fromEntries(contents), { mtime: '1980-01-01T00:00:00' })
