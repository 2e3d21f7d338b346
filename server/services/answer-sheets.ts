import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { AnswerPage, AnswerView, ShareAnswer, SharedAnswer } from '../../shared/schemas/answers'
import type { Decoding } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import {
  findAnswerSheet,
  insertAnswerSheet,
  revokeAnswerSheets,
  standingAnswerSheets,
} from '../database/repositories/answer-sheets'
import { answerView } from './answer-view'
import { readyRow } from './loaded-return'
import { solutionsCsv } from './return-solutions'
import { returnRow } from './returns'
import { newSecret, secretHash } from './secrets'

/** The answer with the links that stand, for members of the workspace. */
export async function answerPage(
  app: App,
  actor: Actor,
  returnId: string,
  asked: { decode: Decoding; assignments: number },
): Promise<AnswerPage> {
  const answer = await answerView(app, actor, returnId, asked)
  const links = await standingAnswerSheets(app.db, returnId)
  return {
    answer,
    links: links.map(({ sheet, by }) => ({
      by,
      at: sheet.createdAt.toISOString(),
      decode: sheet.decode,
      assignments: sheet.solutions,
      remark: sheet.remark,
    })),
  }
}

/**
 * Makes a link under which anyone may read the answer until it is revoked. The secret in it is kept as its hash alone, so
 * the link is shown once.
 */
export async function shareAnswer(
  app: App,
  actor: Actor,
  returnId: string,
  { decode, assignments, remark }: ShareAnswer,
): Promise<{ id: string; url: string }> {
  await readyRow(app, actor, returnId)
  const id = randomUUID()
  const { secret, tokenHash } = newSecret()
  await insertAnswerSheet(app.db, {
    id,
    workspaceId: actor.workspaceId,
    returnId,
    decode,
    solutions: assignments,
    remark,
    tokenHash,
    createdBy: actor.userId,
    createdAt: app.now(),
  })
  return { id, url: `/answers/${secret}` }
}

/** Takes every link to this answer back. */
export async function revokeAnswer(app: App, actor: Actor, returnId: string): Promise<{ revoked: number }> {
  const { id } = await returnRow(app, actor, returnId)
  return { revoked: await revokeAnswerSheets(app.db, id, { revokedBy: actor.userId, revokedAt: app.now() }) }
}

/** @throws DomainError not found: the same for a link that never was, that was revoked, and whose samples are gone */
export async function sharedAnswer(app: App, secret: string): Promise<SharedAnswer> {
  const found = await findAnswerSheet(app.db, secretHash(secret))
  if (!found)
    throw new DomainError(
      'not found',
      'answer.unknown',
      'There is no answer under this link: it was taken back, or the link is incomplete. Ask whoever sent it.',
    )
  const { sheet, by } = found
  const reader: Actor = { userId: sheet.createdBy, workspaceId: sheet.workspaceId }
  const answer = await answerView(app, reader, sheet.returnId, {
    decode: sheet.decode,
    assignments: sheet.solutions,
  })
  return { answer, by: by.name, at: sheet.createdAt.toISOString(), remark: sheet.remark }
}

/** The assignments of an answer as CSV: value, reads, distance, then a column for each variable. */
export const answerCsv = ({ assignments }: AnswerView): string => solutionsCsv(assignments)
