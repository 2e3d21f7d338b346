import type { H3Event } from 'h3'
import { setResponseHeaders } from 'h3'

/** Answers text, its UTF-8 bytes, or bytes of another kind as a download. */
export function sendFile<T extends string | Uint8Array>(
  event: H3Event,
  fileName: string,
  type: string,
  contents: T,
): T {
  const plain = fileName.replace(/[^\w.-]+/g, '-')
  setResponseHeaders(event, {
    'content-type': type.startsWith('text/') ? `${type}; charset=utf-8` : type,
    'content-disposition': `attachment; filename="${plain}"`,
  })
  return contents
}
