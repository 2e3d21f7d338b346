import type { H3Event } from 'h3'
import { setResponseHeaders } from 'h3'

/** Answers text as a download. */
export function sendFile(event: H3Event, fileName: string, type: string, text: string): string {
  const plain = fileName.replace(/[^\w.-]+/g, '-')
  setResponseHeaders(event, {
    'content-type': `${type}; charset=utf-8`,
    'content-disposition': `attachment; filename="${plain}"`,
  })
  return text
}
