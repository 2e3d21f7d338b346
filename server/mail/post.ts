import type { App } from '../app'
import { claimDueMail, keepWaitingMails, settleMail } from '../database/repositories/mails'
import type { MailRow } from '../database/repositories/mails'
import { setFact } from '../database/repositories/people'
import type { Rounds } from '../rounds'
import { keepGoingRound } from '../rounds'
import { createMailer } from './create-mailer'
import type { Mailer } from './mailer'
import { MailRefused } from './mailer'
import type { MailSettings } from './settings'

/**
 * How mail leaves this installation, kept in the database: a worker process that ends a job writes messages too, and knows
 * neither the address of the product nor whether anything takes mail.
 */
export const POST_FACT = 'post'

export interface PostFact {
  site: string
  sends: boolean
}

/** Before any process that serves pages was started: everything is kept. */
const NO_POST: PostFact = { site: 'http://localhost:3000', sends: false }

export const postOf = (fact: string | undefined): PostFact => (fact ? (JSON.parse(fact) as PostFact) : NO_POST)

const LOOK_MS = 2_000
/** Minutes from each attempt to the next; given up at the attempt after the last, after some 45 hours. */
const WAITS = [1, 5, 30, 120, 360, 720, 720, 720] as const
const MAX_ATTEMPTS = WAITS.length + 1
const MINUTE_MS = 60_000
const MAX_REASON = 500

const nextAfter =
  (now: Date) =>
  (attempts: number): Date =>
    new Date(now.getTime() + (WAITS[attempts - 1] ?? WAITS.at(-1)!) * MINUTE_MS)

/** Links of letters that are in no outbox are secrets: their words are not kept when the letter is done with. */
const forgotten = ({ workspaceId }: MailRow) => (workspaceId === null ? { text: '', html: '' } : {})

async function attempt(app: App, mailer: Mailer, mail: MailRow): Promise<void> {
  try {
    await mailer.send({ ...mail, to: mail.toAddress })
  } catch (error) {
    const reason = (error instanceof Error ? error.message : String(error)).slice(0, MAX_REASON)
    const over = error instanceof MailRefused || mail.attempts >= MAX_ATTEMPTS
    const set = over ? { state: 'given up' as const, nextAttemptAt: null, reason, ...forgotten(mail) } : { reason }
    return settleMail(app.db, mail.id, set)
  }
  await settleMail(app.db, mail.id, {
    state: 'sent',
    sentAt: app.now(),
    nextAttemptAt: null,
    reason: null,
    ...forgotten(mail),
  })
}

/**
 * Sends every message that is due, one after the other. A message is sent at least once: where the process ends between
 * the other side's yes and our note of it, it goes again, with the same Message-ID or, to a hosted service, with the same
 * idempotency key.
 * @param stopped asked before each message
 */
export async function deliverDue(app: App, mailer: Mailer, stopped: () => boolean = () => false): Promise<void> {
  while (!stopped()) {
    const now = app.now()
    const mail = await claimDueMail(app.db, now, nextAfter(now))
    if (!mail) return
    await attempt(app, mailer, mail)
  }
}

/** Opens the post of a process that serves pages; where nothing takes mail, messages are kept. */
export async function openPost(app: App, { route, site }: MailSettings): Promise<Rounds> {
  await setFact(app.db, POST_FACT, JSON.stringify({ site, sends: route !== null } satisfies PostFact))
  if (!route) {
    await keepWaitingMails(app.db)
    return { stop: async () => undefined }
  }
  const mailer = createMailer(route)
  return keepGoingRound('mail', LOOK_MS, (stopped) => deliverDue(app, mailer, stopped))
}
