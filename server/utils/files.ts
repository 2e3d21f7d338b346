import type { H3Event } from 'h3'
import { setResponseHeaders } from 'h3'

/** Answers text, or its UTF-8 bytes, as a download. */
export function sendFile<T extends string | Uint8Array>(event: H3Event, fileName: string, type: string, text: T): T {
  const plain = fileName.replace(/[^\w.-]+/g, '-')
  setResponseHeaders(event, {
    'content-type': `${type}; charset=utf-8`,
    'content-disposition': `attachment; filename="${plain}"`,
  })
  return text
}
