import { z } from 'zod'
import { pageQuerySchema } from './common'

/** Messages of a workspace, which each person may want or not. */
export const CHOSEN_MAIL_KINDS = [
  'run sheet handed over',
  'run sheet remark',
  'mention',
  'embedding broken',
  'bridge',
] as const
export type ChosenMailKind = (typeof CHOSEN_MAIL_KINDS)[number]

/** What a message tells: one kind for each reason to write to somebody. */
export type MailKind =
  | ChosenMailKind
  | 'invitation'
  | 'new password'
  | 'password changed'
  | 'new address'
  | 'address changed'
  | 'sign-in changed'
  | 'workspace deletion'

export const isChosenMail = (kind: MailKind): kind is ChosenMailKind =>
  CHOSEN_MAIL_KINDS.some((chosen) => chosen === kind)

/** Kinds that are wanted; all others are not. */
export const mailWishesSchema = z.object({ wanted: z.array(z.enum(CHOSEN_MAIL_KINDS)).max(CHOSEN_MAIL_KINDS.length) })

/** Which messages of a workspace somebody gets. */
export interface MailWishes {
  wanted: ChosenMailKind[]
}

/**
 * waiting: to be sent, or tried again; sent: taken by the mail server or service; kept: there is neither, read it in the
 * product; given up: the server refused it for good.
 */
export const MAIL_STATES = ['waiting', 'sent', 'kept', 'given up'] as const
export type MailState = (typeof MAIL_STATES)[number]

/** `?state&limit&cursor` of the outbox; every state where none is given. */
export const outboxQuerySchema = pageQuerySchema.extend({ state: z.enum(MAIL_STATES).optional() })
export type OutboxQuery = z.infer<typeof outboxQuerySchema>

/** A message as the outbox shows it. */
export interface MailView {
  id: string
  /** The name is null once the person's account is gone. */
  to: { name: string | null; address: string }
  kind: MailKind
  subject: string
  text: string
  state: MailState
  attempts: number
  /** When it is tried next; null when it is not. */
  nextAttemptAt: string | null
  /** What the mail server or service said at the last attempt that failed. */
  reason: string | null
  createdAt: string
  sentAt: string | null
}

export interface OutboxView {
  items: MailView[]
  nextCursor: string | null
  /** Messages in each state. */
  counts: Record<MailState, number>
}
