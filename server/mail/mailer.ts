import type { WrittenLetter } from './letter'

/** A message for one person. */
export interface OutgoingMail extends WrittenLetter {
  /** Stays the same at every attempt, so that the receiving side can drop a copy. */
  id: string
  to: string
}

/** Hands messages to whoever delivers them. */
export interface Mailer {
  /** @throws MailRefused when it will never be taken; any other error when it may be at another time */
  send(mail: OutgoingMail): Promise<void>
}

/** A message was refused for good. */
export class MailRefused extends Error {}

/** All of one attempt; shorter than the wait before the next, so that two attempts never overlap. */
export const ATTEMPT_MS = 45_000

/** RFC 3834: nobody's absence notice answers a message of ours. */
export const HEADERS = { 'Auto-Submitted': 'auto-generated' }
