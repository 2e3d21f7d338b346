import { createTransport } from 'nodemailer'
import type { Mailer } from './mailer'
import { ATTEMPT_MS, HEADERS, MailRefused } from './mailer'
import type { SmtpRoute } from './settings'

const CONNECT_MS = 10_000
const SILENCE_MS = 20_000

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

/** Sends over SMTP (RFC 5321), each message over a connection of its own. */
export function smtpMailer({ url, from }: SmtpRoute): Mailer {
  const domain = domainOf(from)
  return {
    async send({ id, to, subject, text, html }) {
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
        headers: HEADERS,
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
