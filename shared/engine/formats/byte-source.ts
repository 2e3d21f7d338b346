import { ReadingFault } from './format'

/** Bytes that arrive in chunks, taken in pieces of the sizes that a binary format asks for. */
export class ByteSource {
  private readonly chunks: Iterator<Uint8Array>
  private chunk: Uint8Array = new Uint8Array(0)
  private place = 0

  constructor(chunks: Iterable<Uint8Array>) {
    this.chunks = chunks[Symbol.iterator]()
  }

  /**
   * The next bytes, good until the next call; copied only where they stretch over chunks.
   * @throws ReadingFault when fewer are left
   */
  take(count: number): Uint8Array {
    if (this.place + count <= this.chunk.length) return this.chunk.subarray(this.place, (this.place += count))
    const taken = new Uint8Array(count)
    for (let filled = 0; filled < count;) {
      if (!this.hasMore()) throw new ReadingFault('the file is cut short')
      const part = this.chunk.subarray(this.place, this.place + count - filled)
      taken.set(part, filled)
      filled += part.length
      this.place += part.length
    }
    return taken
  }

  hasMore(): boolean {
    while (this.place === this.chunk.length) {
      const next = this.chunks.next()
      if (next.done) return false
      this.chunk = next.value
      this.place = 0
    }
    return true
  }
}
