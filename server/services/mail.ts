import { randomUUID } from 'node:crypto'
import type { MailState, MailView, OutboxQuery, OutboxView } from '../../shared/schemas/mail'
import { MAIL_STATES } from '../../shared/schemas/mail'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { MailRow } from '../database/repositories/mails'
import { addresseesOf, countMails, insertMails, listMails } from '../database/repositories/mails'
import { insertNews } from '../database/repositories/news'
import { pageOf, positionOf } from '../database/repositories/pages'
import { listUnwanted } from '../database/repositories/unwanted-mails'
import { readFact } from '../database/repositories/people'
import type { Letter } from '../mail/letter'
import { writeLetter } from '../mail/letter'
import { newsOfLetter } from '../mail/news-of-letter'
import type { PostFact } from '../mail/post'
import { POST_FACT, postOf } from '../mail/post'

/** What one person is told: where there are several letters, they tell the same, and the first is the one meant for them. */
export type Told = Letter | readonly [Letter, ...Letter[]]

const lettersOf = (told: Told): readonly [Letter, ...Letter[]] => ('kind' in told ? [told] : told)

/**
 * Tells people something, as news in the product and by mail, in the transaction of what they are told: what is rolled back
 * is never told, what is committed is never forgotten. Sending is left to the post. Whoever did it is not told, nor is
 * anybody who left the workspace. The first letter is the news; the mail is the first one of a kind that the person wants.
 * @param told by user id
 */
export async function tell(
  app: App,
  tx: Db,
  { workspaceId, by }: { workspaceId: string; by: string | null },
  told: ReadonlyMap<string, Told>,
): Promise<void> {
  const ids = [...told.keys()].filter((id) => id !== by)
  const members = await addresseesOf(tx, workspaceId, ids)
  const unwanted = await listUnwanted(tx, workspaceId, ids)
  const post = postOf(await readFact(tx, POST_FACT))
  const isWanted = (id: string, { kind }: Letter): boolean =>
    !unwanted.some((one) => one.userId === id && one.kind === kind)
  const mails = members.flatMap(({ id, email }) => {
    const letter = lettersOf(told.get(id)!).find((one) => isWanted(id, one))
    return letter ? [rowOf(app, post, { workspaceId, userId: id, address: email }, letter)] : []
  })
  await insertNews(
    tx,
    members.map(({ id }) => newsRow(app, { workspaceId, userId: id }, lettersOf(told.get(id)!)[0])),
  )
  await insertMails(tx, mails)
}

const newsRow = (app: App, { userId, workspaceId }: Actor, letter: Letter) => ({
  ...{ id: randomUUID(), workspaceId, userId, kind: letter.kind },
  ...newsOfLetter(letter),
  createdAt: app.now(),
})

interface Receiver {
  /** Whose outbox shows it; null for none. */
  workspaceId: string | null
  userId: string | null
  address: string
}

function rowOf(app: App, { site, sends }: PostFact, { workspaceId, userId, address }: Receiver, letter: Letter) {
  const createdAt = app.now()
  return {
    ...{ id: randomUUID(), workspaceId, toUserId: userId, toAddress: address, kind: letter.kind },
    ...writeLetter(letter, site),
    state: sends ? ('waiting' as const) : ('kept' as const),
    nextAttemptAt: sends ? createdAt : null,
    createdAt,
  }
}

/** Writes to somebody about what concerns them alone: no outbox shows it; nothing is kept where no mail is sent. */
export async function writePrivately(
  app: App,
  tx: Db,
  to: Omit<Receiver, 'workspaceId'>,
  letter: Letter,
): Promise<void> {
  await writeSecretLink(app, tx, to, letter)
}

/**
 * Sends a letter whose link is a secret of whoever gets it. No outbox shows it, and its words are forgotten once it is
 * sent; where this installation sends no mail nothing is kept at all.
 * @returns the link where no mail is sent, for whom it may be told
 */
export async function writeSecretLink(
  app: App,
  tx: Db,
  to: Omit<Receiver, 'workspaceId'>,
  letter: Letter,
): Promise<string | null> {
  const post = postOf(await readFact(tx, POST_FACT))
  if (!post.sends) return post.site + letter.action.path
  await insertMails(tx, [rowOf(app, post, { ...to, workspaceId: null }, letter)])
  return null
}

/** Whether this installation has a mail server. */
export const sendsMail = async (app: App): Promise<boolean> => postOf(await readFact(app.db, POST_FACT)).sends

/** Messages of the workspace, newest first. */
export async function outboxOf(app: App, actor: Actor, { state, limit, cursor }: OutboxQuery): Promise<OutboxView> {
  const offset = positionOf(cursor)
  const rows = await listMails(app.db, actor.workspaceId, { state, limit: limit + 1, offset })
  const counted = new Map((await countMails(app.db, actor.workspaceId)).map((row) => [row.state, row.n]))
  const counts = Object.fromEntries(MAIL_STATES.map((name) => [name, counted.get(name) ?? 0]))
  return {
    ...pageOf(
      rows.map(({ mail, name }) => viewOf(mail, name)),
      limit,
      offset,
    ),
    counts: counts as Record<MailState, number>,
  }
}

const viewOf = (mail: MailRow, name: string | null): MailView => ({
  id: mail.id,
  to: { name, address: mail.toAddress },
  kind: mail.kind,
  subject: mail.subject,
  text: mail.text,
  state: mail.state,
  attempts: mail.attempts,
  nextAttemptAt: mail.nextAttemptAt?.toISOString() ?? null,
  reason: mail.reason,
  createdAt: mail.createdAt.toISOString(),
  sentAt: mail.sentAt?.toISOString() ?? null,
})
