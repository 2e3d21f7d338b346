import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import {
  deleteAnswered,
  deleteAnsweredBefore,
  findAnswered,
  saveAnswer,
  takeKey,
} from '../database/repositories/answered-requests'

const KEPT_MS = 24 * 60 * 60 * 1000
/** No request takes so long: who was answering it is gone. */
const ABANDONED_MS = 10 * 60 * 1000

/** An answer as it was given. */
export interface KeptAnswer {
  /** Method, address and body, the body as its SHA-256. */
  request: string
  status: number
  answer: unknown
}

const before = (app: App, milliseconds: number): Date => new Date(app.now().getTime() - milliseconds)

/**
 * Takes a key of the caller's for a request that is about to be answered.
 * @returns the answer that was given under the key already, or null: then it is to be answered now
 * @throws DomainError while a request with this key is being answered
 */
export async function beginAnswer(app: App, actor: Actor, key: string): Promise<KeptAnswer | null> {
  const times = { now: app.now(), forgotten: before(app, KEPT_MS), abandoned: before(app, ABANDONED_MS) }
  if (await takeKey(app.db, actor, { key, request: '', ...times })) return null
  const row = await findAnswered(app.db, actor, key)
  if (row && row.status !== null) return { request: row.request, status: row.status, answer: row.answer }
  throw new DomainError(
    'wrong state',
    'request.being-answered',
    'A request with this Idempotency-Key is being answered. Ask again in a moment.',
  )
}

/** Keeps an answer for a day, for when it is asked for again under the key. */
export const keepAnswer = (app: App, actor: Actor, key: string, answer: KeptAnswer): Promise<void> =>
  saveAnswer(app.db, actor, key, answer)

/** Gives a key free: what was asked for under it was not done. */
export const releaseKey = (app: App, actor: Actor, key: string): Promise<void> => deleteAnswered(app.db, actor, key)

export const sweepAnswers = (app: App): Promise<void> => deleteAnsweredBefore(app.db, before(app, KEPT_MS))
