import { peek } from './chunks'
import { ReadingFault, type FileReading } from './format'

/** A file without what it was packed in. */
export interface Opened {
  readonly container: FileReading['container']
  readonly chunks: Iterable<Uint8Array>
}

const GZIP_MAGIC = [0x1f, 0x8b] as const

/**
 * The chunks of a file without what it was packed in.
 * @throws ReadingFault for a file that is packed
 */
export function openContainer(source: Iterable<Uint8Array>): Opened {
  const { head, chunks } = peek(source, GZIP_MAGIC.length)
  if (head[0] === GZIP_MAGIC[0] && head[1] === GZIP_MAGIC[1])
    throw new ReadingFault('the file is packed with gzip: unpack it first')
  return { container: null, chunks }
}
