import { once } from 'node:events'
import type { ServerResponse } from 'node:http'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'

/** What a bridge was sent. */
export interface ReceivedCall {
  headers: Record<string, string | string[] | undefined>
  body: string
}

export interface FakeBridge {
  url: string
  received: ReceivedCall[]
  /** How it answers; 202 where nothing else is set. */
  answer: (response: ServerResponse, call: ReceivedCall) => void
  close(): void
}

const TAKEN: FakeBridge['answer'] = (response) => response.writeHead(202).end('taken')

/** A bridge on this machine that notes what it is sent and answers as it is told. */
export async function startFakeBridge(): Promise<FakeBridge> {
  const received: ReceivedCall[] = []
  const server = createServer((request, response) => {
    let body = ''
    request.on('data', (chunk: Buffer) => (body += chunk.toString()))
    request.on('end', () => {
      const call = { headers: request.headers, body }
      received.push(call)
      bridge.answer(response, call)
    })
  }).listen(0, '127.0.0.1')
  await once(server, 'listening')
  const bridge: FakeBridge = {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/runs`,
    received,
    answer: TAKEN,
    close() {
      server.closeAllConnections()
      server.close()
    },
  }
  return bridge
}
