import type { Mailer } from '../../server/mail/mailer'

/** Hands a message over and never learns that it did, as a process that ends at that moment. */
export const dyingAfter = (mailer: Mailer): Mailer => ({
  async send(mail) {
    await mailer.send(mail)
    await new Promise(() => undefined)
  },
})
