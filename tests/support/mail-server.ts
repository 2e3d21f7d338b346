import { once } from 'node:events'
import type { AddressInfo } from 'node:net'
import type { ParsedMail } from 'mailparser'
import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'

/** What the server says to a message: takes it, or refuses it with these digits at the envelope or after the text. */
export type Answer = 'take' | { at: 'envelope' | 'text'; code: number }

/** A real mail server on a port of this machine. */
export interface MailServer {
  url: string
  /** Everything taken, as its reader would see it, and the addresses it was really for. */
  taken: { mail: ParsedMail; raw: string; to: string[] }[]
  answer: Answer
  /** Called when a message is taken, before that is said. */
  onTaken: () => void
  close(): Promise<void>
}

const refusal = (code: number): Error => Object.assign(new Error('not now or not at all'), { responseCode: code })

export async function startMailServer(port = 0): Promise<MailServer> {
  const state: MailServer = {
    url: '',
    taken: [],
    answer: 'take',
    onTaken: () => undefined,
    close: async () => undefined,
  }
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onRcptTo(_address, _session, done) {
      const { answer } = state
      done(answer !== 'take' && answer.at === 'envelope' ? refusal(answer.code) : null)
    },
    onData(stream, session, done) {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('end', async () => {
        const { answer } = state
        if (answer !== 'take' && answer.at === 'text') return done(refusal(answer.code))
        const raw = Buffer.concat(chunks).toString()
        const to = session.envelope.rcptTo.map(({ address }) => address)
        state.taken.push({ mail: await simpleParser(raw), raw, to })
        state.onTaken()
        done(null)
      })
    },
  })
  server.on('error', () => undefined)
  server.listen(port, '127.0.0.1')
  await once(server.server, 'listening')
  state.url = `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`
  state.close = () => new Promise((resolve) => server.close(() => resolve()))
  return state
}
