import { ReadingFault, type ReadingControl } from './format'

const DEFAULTS = { chunkBytes: 2 ** 20 }

/** A whole file as chunks of at most 1 MiB, nothing copied. */
export function* chunksOf(bytes: Uint8Array): Generator<Uint8Array> {
  for (let start = 0; start < bytes.length; start += DEFAULTS.chunkBytes)
    yield bytes.subarray(start, start + DEFAULTS.chunkBytes)
}

/**
 * The same chunks, with each one reported before it is handed on.
 * @throws ReadingFault once the work is cancelled
 */
export function* watched(chunks: Iterable<Uint8Array>, control: ReadingControl | undefined): Generator<Uint8Array> {
  let bytes = 0
  for (const chunk of chunks) {
    if (control?.cancelled()) throw new ReadingFault('the reading was cancelled')
    control?.report({ bytes })
    yield chunk
    bytes += chunk.length
  }
}

/** All chunks in one array. */
export function collected(chunks: Iterable<Uint8Array>): Uint8Array {
  const parts = [...chunks]
  if (parts.length === 1) return parts[0]!
  const whole = new Uint8Array(parts.reduce((length, part) => length + part.length, 0))
  let place = 0
  for (const part of parts) {
    whole.set(part, place)
    place += part.length
  }
  return whole
}

/** The first bytes of a source, and the source as if they had not been taken. */
export interface Peeked {
  /** At least `length` bytes unless the source ends before. */
  readonly head: Uint8Array
  readonly isWhole: boolean
  readonly chunks: Iterable<Uint8Array>
}

/** Looks at the beginning of a source without losing it. What comes of it can be run through once. */
export function peek(source: Iterable<Uint8Array>, length: number): Peeked {
  const iterator = source[Symbol.iterator]()
  const taken: Uint8Array[] = []
  let isWhole = false
  for (let bytes = 0; bytes < length && !isWhole;) {
    // The source may use its memory again for the next chunk.
    const last = taken.at(-1)
    if (last) taken[taken.length - 1] = last.slice()
    const next = iterator.next()
    if (next.done) isWhole = true
    else {
      taken.push(next.value)
      bytes += next.value.length
    }
  }
  function* chunks(): Generator<Uint8Array> {
    yield* taken
    for (let next = iterator.next(); !next.done; next = iterator.next()) yield next.value
  }
  return { head: collected(taken), isWhole, chunks: chunks() }
}
