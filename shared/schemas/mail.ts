/** What a message tells: one kind for each reason to write to somebody. */
export type MailKind = 'embedding broken' | 'run sheet handed over'

/**
 * waiting: to be sent, or tried again; sent: taken by the mail server; kept: there is no mail server, read it in the
 * product; given up: the server refused it for good.
 */
export type MailState = 'waiting' | 'sent' | 'kept' | 'given up'

/** A message as the outbox shows it. */
export interface MailView {
  id: string
  to: { name: string | null; address: string }
  kind: MailKind
  subject: string
  text: string
  state: MailState
  attempts: number
  reason: string | null
  createdAt: string
  sentAt: string | null
}
