import type { H3Event } from 'h3'
import type { Readable } from 'node:stream'
import { finished } from 'node:stream/promises'
import { sendStream, setResponseHeaders } from 'h3'
import { inTemporaryFolder } from '../services/stored-files'

/** Answers text, its UTF-8 bytes, or bytes of another kind as a download. */
export function sendFile<T extends string | Uint8Array>(
  event: H3Event,
  fileName: string,
  type: string,
  contents: T,
): T {
  announceFile(event, fileName, type)
  return contents
}

function announceFile(event: H3Event, fileName: string, type: string): void {
  const plain = fileName.replace(/[^\w.-]+/g, '-')
  setResponseHeaders(event, {
    'content-type': type.startsWith('text/') ? `${type}; charset=utf-8` : type,
    'content-disposition': `attachment; filename="${plain}"`,
  })
}

/** Answers a download that is made while it is sent, out of a folder that is gone afterwards. */
export async function sendPacked(
  event: H3Event,
  type: string,
  make: (folder: string) => Promise<{ fileName: string; stream: Readable }>,
): Promise<void> {
  await inTemporaryFolder(async (folder) => {
    const { fileName, stream } = await make(folder)
    announceFile(event, fileName, type)
    const { res } = event.node
    // Whoever goes away ends the packing too; a fault on the way ends the connection, so that the file is seen to be cut.
    res.once('close', () => stream.destroy())
    stream.once('error', (error) => res.destroy(error))
    await Promise.allSettled([sendStream(event, stream), finished(stream)])
  })
}
