import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { DomainError } from '../../shared/errors'
import { noteNothingDone, noteOutcome } from './audited'
import { toHttpError } from './http'

const LINES = 'application/x-ndjson'

/** What long work may tell and be told while it goes on. */
export interface Telling<P> {
  readonly tell: (progress: P) => void
  /** Comes when the client has gone. */
  readonly signal: AbortSignal
}

function failureLine(error: unknown): unknown {
  if (!(error instanceof DomainError)) {
    console.error(error)
    return { failed: { statusCode: 500 } }
  }
  const { statusCode, data } = toHttpError(error)
  return { failed: { statusCode, data } }
}

/**
 * Answers with the outcome of work that a person waits for. Where the client takes `application/x-ndjson` it is told how far
 * the work is, one JSON object a line: `{progress}` any number of times, then `{done}` with the outcome or `{failed}` with
 * the status and the error that would have been answered; the status of the answer itself is then always 200. A client that
 * goes away ends the work.
 */
export async function answerWithProgress<P, T>(
  event: H3Event,
  work: (telling: Telling<P>) => Promise<T>,
): Promise<T | undefined> {
  const response = event.node.res
  const gone = new AbortController()
  response.on('close', () => response.writableFinished || gone.abort())
  if (!getHeader(event, 'accept')?.includes(LINES)) return work({ tell: () => {}, signal: gone.signal })
  response.writeHead(200, { 'content-type': `${LINES}; charset=utf-8`, 'cache-control': 'no-store' })
  const write = (line: unknown): boolean => response.write(`${JSON.stringify(line)}\n`)
  // The headers go at once, so that the client knows that its file has arrived.
  response.flushHeaders()
  try {
    const done = await work({ tell: (progress) => write({ progress }), signal: gone.signal })
    noteOutcome(event, done)
    write({ done })
  } catch (error) {
    noteNothingDone(event)
    write(failureLine(error))
  }
  response.end()
  return undefined
}
