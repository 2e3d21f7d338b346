import { createHash } from 'node:crypto'
import type { H3Event } from 'h3'
import { getHeader, getResponseStatus, readRawBody, setResponseStatus } from 'h3'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import type { KeptAnswer } from '../services/answered-requests'
import { beginAnswer, keepAnswer, releaseKey } from '../services/answered-requests'
import { requireModestBody } from './http'

/** Ends the work on a request that was answered before. */
class AnsweredBefore extends Error {
  constructor(readonly kept: KeptAnswer) {
    super('answered before')
  }
}

type Part = string | Uint8Array

/** For requests with a key: what is done once their body is known. */
const waiting = new WeakMap<H3Event, (parts: readonly Part[]) => void>()

/**
 * Says what the body of a form was, whose bytes differ from one sending to the next by the boundary between its parts.
 * @throws AnsweredBefore where the request was answered under its key; DomainError where the key was another request's
 */
export function formRead(event: H3Event, fields: Record<string, string>, ...file: readonly Part[]): void {
  waiting.get(event)?.([JSON.stringify(Object.entries(fields).sort()), ...file])
}

/** The `Idempotency-Key` of a POST, if it has one. */
export function keyOf(event: H3Event): string | undefined {
  const key = event.method === 'POST' ? getHeader(event, 'idempotency-key') : undefined
  if (key === undefined || /^[\x21-\x7e]{1,200}$/.test(key)) return key
  throw new DomainError('unreadable', 'request.key', 'An Idempotency-Key has 1 to 200 visible ASCII characters.')
}

function digestOf(event: H3Event, parts: readonly Part[]): string {
  const hash = createHash('sha256')
  for (const part of parts) hash.update(`${part.length} `).update(part)
  return `${event.method} ${event.path} ${hash.digest('hex')}`
}

function requireSame(kept: KeptAnswer | null, request: string): void {
  if (!kept) return
  if (kept.request === request) throw new AnsweredBefore(kept)
  throw new DomainError(
    'not acceptable',
    'request.key-reused',
    'This Idempotency-Key was used for another request. Give every request a key of its own, and keep it only to ask again.',
  )
}

/** What can be kept: answers in JSON, which is all that makes something. */
const canBeKept = (answer: unknown): boolean =>
  answer !== undefined && typeof answer !== 'string' && !(answer instanceof Uint8Array)

/**
 * Answers a request with a key once: asked again, it gets the same answer and nothing is done. What was refused was not
 * done, and is tried anew.
 */
export async function answeredOnce<T>(
  event: H3Event,
  { app, actor, key }: { app: App; actor: Actor; key: string },
  work: () => Promise<T> | T,
): Promise<unknown> {
  if (getHeader(event, 'accept')?.includes('ndjson'))
    throw new DomainError(
      'not acceptable',
      'request.key-progress',
      'An answer that tells its progress cannot be given twice. Leave out the Idempotency-Key or the Accept header.',
    )
  const kept = await beginAnswer(app, actor, key)
  let request = ''
  const bodyKnown = (parts: readonly Part[]): void => {
    request = digestOf(event, parts)
    requireSame(kept, request)
  }
  try {
    if (getHeader(event, 'content-type')?.startsWith('multipart/')) waiting.set(event, bodyKnown)
    else {
      requireModestBody(event)
      bodyKnown([(await readRawBody(event, false)) ?? ''])
    }
    const answer = await work()
    if (request && canBeKept(answer))
      await keepAnswer(app, actor, key, { request, status: getResponseStatus(event), answer })
    else if (!kept) await releaseKey(app, actor, key)
    return answer
  } catch (error) {
    if (error instanceof AnsweredBefore) {
      setResponseStatus(event, error.kept.status)
      return error.kept.answer
    }
    if (!kept) await releaseKey(app, actor, key)
    throw error
  }
}
