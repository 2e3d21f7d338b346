/** Bytes in chunks as blocks of whole lines. */
import { peek } from './chunks'

const LINE_FEED = 0x0a
const CARRIAGE_RETURN = 0x0d
const BYTE_ORDER_MARK = [0xef, 0xbb, 0xbf] as const
const DEFAULTS = { headBytes: 65_536 }

/** Whole lines: bytes[start, end), where bytes[end − 1] is a line feed. */
export interface Block {
  readonly bytes: Uint8Array
  readonly start: number
  readonly end: number
}

/** Parts of a line put together, with a line feed behind them. */
function lineOf(parts: readonly Uint8Array[]): Block {
  const end = parts.reduce((length, part) => length + part.length, 1)
  const bytes = new Uint8Array(end)
  let place = 0
  for (const part of parts) {
    bytes.set(part, place)
    place += part.length
  }
  bytes[place] = LINE_FEED
  return { bytes, start: 0, end }
}

/** Without the first bytes, which may be spread over chunks. */
function* without(count: number, chunks: Iterable<Uint8Array>): Generator<Uint8Array> {
  let left = count
  for (const chunk of chunks) {
    const skip = Math.min(left, chunk.length)
    left -= skip
    if (skip < chunk.length) yield chunk.subarray(skip)
  }
}

function* withLineFeeds(chunks: Iterable<Uint8Array>): Generator<Uint8Array> {
  for (const chunk of chunks) yield chunk.map((code) => (code === CARRIAGE_RETURN ? LINE_FEED : code))
}

/**
 * The lines of a file in blocks, without a byte order mark, the last line ended by a line feed even where the file's is
 * not. Lines end with LF or CRLF, or with CR alone when the first 64 KiB have no LF. A line that stretches over chunks is
 * a block of its own, and is the only thing copied.
 */
export function* blocksOf(source: Iterable<Uint8Array>): Generator<Block> {
  const { head, chunks } = peek(source, DEFAULTS.headBytes)
  const hasMark = BYTE_ORDER_MARK.every((code, place) => head[place] === code)
  const unmarked = hasMark ? without(BYTE_ORDER_MARK.length, chunks) : chunks
  const isOld = head.includes(CARRIAGE_RETURN) && !head.includes(LINE_FEED)
  let begun: Uint8Array[] = []
  for (const chunk of isOld ? withLineFeeds(unmarked) : unmarked) {
    if (chunk.length === 0) continue
    const first = chunk.indexOf(LINE_FEED)
    if (first < 0) {
      // The source may use its memory again.
      begun.push(chunk.slice())
      continue
    }
    let start = 0
    if (begun.length > 0) {
      yield lineOf([...begun, chunk.subarray(0, first)])
      begun = []
      start = first + 1
    }
    const end = chunk.lastIndexOf(LINE_FEED) + 1
    if (end > start) yield { bytes: chunk, start, end }
    if (end < chunk.length) begun.push(chunk.slice(end))
  }
  if (begun.length > 0) yield lineOf(begun)
}

/** The end of the line bytes[start, feed), without the CR of a CRLF. */
export const lineEnd = (bytes: Uint8Array, start: number, feed: number): number =>
  feed > start && bytes[feed - 1] === CARRIAGE_RETURN ? feed - 1 : feed

/** Visits each line as bytes[start, end) with its number from 1, without its line ending. Nothing else is copied. */
export function eachLine(
  source: Iterable<Uint8Array>,
  visit: (bytes: Uint8Array, start: number, end: number, line: number) => void,
): void {
  let line = 0
  for (const { bytes, start: first, end: last } of blocksOf(source))
    for (let start = first; start < last;) {
      const feed = bytes.indexOf(LINE_FEED, start)
      visit(bytes, start, lineEnd(bytes, start, feed), ++line)
      start = feed + 1
    }
}
