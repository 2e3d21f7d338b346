import { gunzip, isGzip } from './archive'
import { peek } from './chunks'
import type { FileReading } from './format'

/** A file without what it was packed in. */
export interface Opened {
  readonly container: FileReading['container']
  readonly chunks: Iterable<Uint8Array>
}

const MAGIC_LENGTH = 2

/** The chunks of a file without what it was packed in; a fault of the packing is thrown by the chunks (`ReadingFault`). */
export function openContainer(source: Iterable<Uint8Array>): Opened {
  const { head, chunks } = peek(source, MAGIC_LENGTH)
  return isGzip(head) ? { container: 'gzip', chunks: gunzip(chunks) } : { container: null, chunks }
}
