import type { H3Event } from 'h3'

/** Aborts when the caller goes away before it was answered. */
export function goneSignal(event: H3Event): AbortSignal {
  const gone = new AbortController()
  const { res } = event.node
  res.once('close', () => {
    if (!res.writableEnded) gone.abort()
  })
  return gone.signal
}
