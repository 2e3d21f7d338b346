import type { MailState, MailView } from '#shared/schemas/mail'
import type { MarkKind } from '../ui/parts'
import { formatCount } from '../format'
import { formatDateTime } from '../formatTime'

export const MAIL_MARKS: Record<MailState, MarkKind> = {
  waiting: 'caution',
  sent: 'passed',
  kept: 'computed',
  'given up': 'refused',
}

/** What became of a message, in a sentence. */
export function mailStanding({ state, attempts, reason, sentAt, nextAttemptAt }: MailView): string {
  if (state === 'sent') return `Taken for delivery ${formatDateTime(sentAt)}, at attempt ${attempts}.`
  if (state === 'kept') return 'There is no mail server: it was not sent, and can be read here.'
  const said = reason ? ` The last one: ${reason}` : ''
  if (state === 'given up') return `Given up after ${formatCount(attempts, 'attempt')}.${said}`
  if (attempts === 0) return 'About to be sent.'
  return `Tried ${attempts === 1 ? 'once' : `${attempts} times`}; next ${formatDateTime(nextAttemptAt)}.${said}`
}

/** The text of a message in pieces: its links lead to the pages of this installation that they are about. */
export function linkedText(text: string): { text: string; to: string | null }[] {
  return text.split(/(https?:\/\/\S+)/).map((piece, k) => ({ text: piece, to: k % 2 === 1 ? pathOf(piece) : null }))
}

const KNOWN = /^\/(?:embeddings|machines|run-sheets)\/[\w-]{1,64}$/

function pathOf(address: string): string | null {
  if (!URL.canParse(address)) return null
  const { pathname, hash } = new URL(address)
  const path = /\/(?:embeddings|machines|run-sheets)\/[\w-]+$/.exec(pathname)?.[0] ?? ''
  return KNOWN.test(path) ? path + hash : null
}
