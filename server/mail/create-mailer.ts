import { hostedMailer } from './hosted'
import type { Mailer } from './mailer'
import { MailRefused } from './mailer'
import type { MailRoute } from './settings'
import { smtpMailer } from './smtp'

/** One address and nothing that could name a second. */
const ADDRESS = /^[^\s<>(),;:\\"@]+@[^\s<>(),;:\\"@]+$/

/** Sends by the way this installation was given. */
export function createMailer(route: MailRoute): Mailer {
  const mailer = route.by === 'smtp' ? smtpMailer(route) : hostedMailer(route)
  return {
    async send(mail) {
      if (!ADDRESS.test(mail.to)) throw new MailRefused('this is not a mail address')
      await mailer.send(mail)
    },
  }
}
