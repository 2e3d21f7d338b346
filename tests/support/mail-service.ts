import { once } from 'node:events'
import type { IncomingMessage } from 'node:http'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { text as textOf } from 'node:stream/consumers'

/** A message as the service is given it. */
export interface ServiceMail {
  from: string
  to: string
  subject: string
  text: string
  html: string
  headers: Record<string, string>
}

/** What the service says to the next requests instead of taking them; without a body it never answers. */
export interface ServiceRefusal {
  status: number
  body?: unknown
  headers?: Record<string, string>
}

/**
 * A stand-in for the hosted mail service on a port of this machine. It speaks `POST /emails` as the service publishes it
 * (resend.com/docs/api-reference, read from the types of its SDK 6.38): a bearer key, one JSON message, an
 * `Idempotency-Key` under which the same message is taken once and another one refused.
 */
export interface MailService {
  url: string
  key: string
  /** What was delivered, each once. */
  taken: ServiceMail[]
  /** How often it was asked. */
  asked: number
  /** Answers to the next requests, one each; when none is left, messages are taken. */
  refusals: ServiceRefusal[]
  close(): Promise<void>
}

const refused = (statusCode: number, name: string, message: string) => ({
  status: statusCode,
  body: { statusCode, name, message },
})

function taking(service: MailService) {
  const answers = new Map<string, { words: string; id: string }>()
  return (request: IncomingMessage, words: string): ServiceRefusal => {
    if (request.method !== 'POST' || request.url !== '/emails') return refused(404, 'not_found', 'no such address')
    if (request.headers.authorization !== `Bearer ${service.key}`)
      return refused(401, 'invalid_api_key', 'API key is invalid')
    const key = String(request.headers['idempotency-key'])
    const before = answers.get(key)
    if (before && before.words !== words)
      return refused(409, 'invalid_idempotent_request', 'this key was used with another message')
    if (!before) {
      answers.set(key, { words, id: `mail-${answers.size + 1}` })
      service.taken.push(JSON.parse(words) as ServiceMail)
    }
    return { status: 200, body: { id: answers.get(key)!.id } }
  }
}

export async function startMailService(): Promise<MailService> {
  const service: MailService = {
    url: '',
    key: 're_key-of-the-tests',
    taken: [],
    asked: 0,
    refusals: [],
    close: async () => undefined,
  }
  const take = taking(service)
  const server = createServer(async (request, response) => {
    service.asked += 1
    const words = await textOf(request)
    const { status, body, headers } = service.refusals.shift() ?? take(request, words)
    if (body === undefined) return
    response.writeHead(status, { 'content-type': 'application/json', ...headers })
    response.end(typeof body === 'string' ? body : JSON.stringify(body))
  })
  server.listen(0, '127.0.0.1')
  await once(server, 'listening')
  service.url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  service.close = async () => {
    server.closeAllConnections()
    server.close()
  }
  return service
}
