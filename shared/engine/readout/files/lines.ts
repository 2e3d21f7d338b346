import { ReadingFault } from '../../formats/format'

const LINE_FEED = 10
const CARRIAGE_RETURN = 13
const DEFAULTS = { longestLine: 16 * 2 ** 20 }

/** A line as a range of bytes, without its end; good until the next one is asked for. */
export interface ByteLine {
  readonly bytes: Uint8Array
  readonly start: number
  readonly end: number
  /** From 1. */
  readonly number: number
}

function joined(a: Uint8Array, b: Uint8Array): Uint8Array {
  if (a.length + b.length > DEFAULTS.longestLine)
    throw new ReadingFault(`a line is longer than ${DEFAULTS.longestLine / 2 ** 20} MiB: this is no table of samples`)
  const both = new Uint8Array(a.length + b.length)
  both.set(a)
  both.set(b, a.length)
  return both
}

const line = (bytes: Uint8Array, start: number, end: number, number: number): ByteLine => ({
  bytes,
  start,
  end: end > start && bytes[end - 1] === CARRIAGE_RETURN ? end - 1 : end,
  number,
})

/**
 * The lines of a text that comes in chunks, cut anywhere; a line is copied only where it stretches over chunks.
 * @throws ReadingFault while iterating, for a line beyond 16 MiB
 */
export function* byteLines(chunks: Iterable<Uint8Array>): Generator<ByteLine, void, undefined> {
  let number = 0
  let held: Uint8Array = new Uint8Array(0)
  for (const chunk of chunks) {
    let start = 0
    for (;;) {
      const feed = chunk.indexOf(LINE_FEED, start)
      if (feed < 0) break
      if (held.length > 0) {
        const whole = joined(held, chunk.subarray(0, feed))
        held = new Uint8Array(0)
        yield line(whole, 0, whole.length, ++number)
      } else yield line(chunk, start, feed, ++number)
      start = feed + 1
    }
    // The source may use its memory again for the next chunk.
    const rest = chunk.subarray(start)
    held = held.length > 0 ? joined(held, rest) : rest.slice()
  }
  if (held.length > 0) yield line(held, 0, held.length, ++number)
}
