import { createTransport } from 'nodemailer'
import type { WrittenLetter } from './letter'
import type { MailSettings } from './settings'

/** A message for one person. */
export interface OutgoingMail extends WrittenLetter {
  /** Stays the same at every attempt, so that the receiving side can drop a copy. */
  id: string
  to: string
}

/** Hands messages to a mail server. */
export interface Mailer {
  /** @throws MailRefused when the server will never take it; any other error when it may at another time */
  send(mail: OutgoingMail): Promise<void>
}

/** The mail server refused a message for good. */
export class MailRefused extends Error {}

const CONNECT_MS = 10_000
const SILENCE_MS = 20_000
/** All of one attempt; shorter than the wait before the next, so that two attempts never overlap. */
const ATTEMPT_MS = 45_000

const ADDRESS = /^[^\s<>(),;:\\"@]+@[^\s<>(),;:\\"@]+$/

const domainOf = (from: string): string => /@([^\s<>@]+?)>?$/.exec(from)![1]!

interface SmtpError extends Error {
  /** Which step failed, such as EENVELOPE or EMESSAGE. */
  code?: string
  /** The server's three digits. */
  responseCode?: number
}

/** 5xx to the envelope or to the message is final; a refused sign-in or connection is for the owner to mend. */
const isFinal = ({ code, responseCode = 0 }: SmtpError): boolean =>
  responseCode >= 500 && (code === 'EENVELOPE' || code === 'EMESSAGE')

function withinTime<T>(work: Promise<T>, stop: () => void): Promise<T> {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => {
      stop()
      reject(new Error(`the mail server did not finish within ${ATTEMPT_MS / 1000} s`))
    }, ATTEMPT_MS)
  })
  return Promise.race([work, late]).finally(() => clearTimeout(timer))
}

/** Sends over SMTP, each message over a connection of its own. */
export function createMailer({ url, from }: NonNullable<MailSettings['smtp']>): Mailer {
  const domain = domainOf(from)
  return {
    async send({ id, to, subject, text, html }) {
      if (!ADDRESS.test(to)) throw new MailRefused('this is not a mail address')
      const transport = createTransport({
        url,
        connectionTimeout: CONNECT_MS,
        greetingTimeout: CONNECT_MS,
        socketTimeout: SILENCE_MS,
        disableFileAccess: true,
        disableUrlAccess: true,
      })
      const message = {
        from,
        to: { name: '', address: to },
        subject,
        text,
        html,
        messageId: `<${id}@${domain}>`,
        // RFC 3834: nobody's absence notice answers this.
        headers: { 'Auto-Submitted': 'auto-generated' },
      }
      try {
        await withinTime(transport.sendMail(message), () => transport.close())
      } catch (error) {
        if (isFinal(error as SmtpError)) throw new MailRefused((error as Error).message)
        throw error
      } finally {
        transport.close()
      }
    },
  }
}
