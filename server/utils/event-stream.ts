import type { EventStream, H3Event } from 'h3'
import { createEventStream } from 'h3'

/** So that proxies do not take a silent stream for a dead one. */
const PING_MS = 15_000

const open = new Set<EventStream>()
let isStopping = false

/**
 * Opens a stream of server-sent events, pinged now and then.
 * @param onClosed once it has ended, from either side
 */
export function openEventStream(event: H3Event, onClosed: () => void): EventStream {
  const stream = createEventStream(event)
  const pinging = setInterval(() => void stream.push({ event: 'ping', data: '' }), PING_MS)
  open.add(stream)
  stream.onClosed(() => {
    clearInterval(pinging)
    open.delete(stream)
    onClosed()
  })
  if (isStopping) void stream.close()
  return stream
}

/**
 * Ends what browsers follow, now and from now on: a server that is told to stop would wait for it, as for any request that
 * it still answers. They come back by themselves, to whichever process is there then.
 */
export function endEventStreams(): void {
  isStopping = true
  for (const stream of open) void stream.close()
}
