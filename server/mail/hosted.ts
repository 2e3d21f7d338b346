import { setTimeout as pause } from 'node:timers/promises'
import type { ErrorResponse } from 'resend'
import { Resend } from 'resend'
import type { Mailer } from './mailer'
import { ATTEMPT_MS, HEADERS, MailRefused } from './mailer'
import type { HostedRoute } from './settings'

/** Longest pause that the service may ask for within one attempt. */
const MAX_PAUSE_MS = 10_000

/** What is wrong with the message itself; anything else, such as a key or a sender not known, is for the owner to mend. */
const FINAL_STATUS = [400, 413, 422]
/** The same message was taken before, with other words: it is not sent a second time. */
const TAKEN_BEFORE = 'invalid_idempotent_request'

const isFinal = ({ name, statusCode }: Partial<ErrorResponse>): boolean =>
  name === TAKEN_BEFORE || (FINAL_STATUS.includes(statusCode ?? 0) && name !== 'invalid_from_address')

/** How long to wait where requests only came too fast; null where waiting that long does not help. */
function pauseOf(name: string | undefined, headers: Record<string, string> | null): number | null {
  if (name !== 'rate_limit_exceeded') return null
  const milliseconds = Math.max(1, Number(headers?.['retry-after'] ?? 1)) * 1000
  return milliseconds <= MAX_PAUSE_MS ? milliseconds : null
}

function failureOf(error: Partial<ErrorResponse>, seconds: number): Error {
  const { statusCode, name, message } = error
  if (!statusCode)
    return new Error(`the mail service could not be reached, or gave no answer that can be read within ${seconds} s`)
  const words = `the mail service answered ${statusCode} ${name}: ${message}`
  return isFinal(error) ? new MailRefused(words) : new Error(words)
}

/**
 * Sends through a hosted mail service by its own SDK. Each message carries its id as the service's idempotency key, so
 * that one that is sent again is not delivered again.
 */
export function hostedMailer({ key, url, from }: HostedRoute, attemptMs = ATTEMPT_MS): Mailer {
  const service = new Resend(key, { baseUrl: url })
  return {
    async send({ id, to, subject, text, html }) {
      const end = Date.now() + attemptMs
      const signal = AbortSignal.timeout(attemptMs)
      const message = { from, to, subject, text, html, headers: HEADERS }
      for (;;) {
        const { data, error, headers } = await service.emails.send(message, { idempotencyKey: id, signal })
        // What stands between may answer with anything: only an id says that the message was taken.
        if (data?.id) return
        const wait = pauseOf(error?.name, headers)
        if (wait === null || Date.now() + wait > end) throw failureOf(error ?? {}, attemptMs / 1000)
        await pause(wait)
      }
    },
  }
}
