import { once } from 'node:events'
import type { IncomingMessage, Server, ServerResponse } from 'node:http'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { addressRules } from '../../../../server/bridge/addresses'
import { createOutbound, OutboundRefused } from '../../../../server/bridge/outbound'

let server: Server
let port: number
let asked: { url?: string; body: string; headers: IncomingMessage['headers'] }[]
let answer: (response: ServerResponse) => void
beforeEach(async () => {
  asked = []
  answer = (response) => response.end('taken')
  server = createServer((request, response) => {
    let body = ''
    request.on('data', (chunk: Buffer) => (body += chunk.toString()))
    request.on('end', () => {
      asked.push({ url: request.url, body, headers: request.headers })
      answer(response)
    })
  }).listen(0, '127.0.0.1')
  await once(server, 'listening')
  port = (server.address() as AddressInfo).port
})
afterEach(() => {
  server.closeAllConnections()
  server.close()
})

const allowing = createOutbound(addressRules('127.0.0.0/8'), 1000)
const post = (host: string, outbound = allowing) =>
  outbound.post(`http://${host}:${port}/runs`, { 'x-a': 'b' }, '{"é":1}')

describe('a call', () => {
  it('sends headers and body, and reads the answer', async () => {
    answer = (response) => response.writeHead(202, { 'retry-after': '30' }).end('later')
    expect(await post('127.0.0.1')).toEqual({ status: 202, retryAfter: '30', location: null, text: 'later' })
    expect(asked).toMatchObject([{ url: '/runs', body: '{"é":1}', headers: { 'x-a': 'b', 'content-length': '8' } }])
  })

  it.each(['127.0.0.1', 'localhost', '[::1]', '0x7f000001', '2130706433', '[::ffff:127.0.0.1]', '127.1'])(
    'to %s is refused before anything is sent, unless it is allowed',
    async (host) => {
      const closed = createOutbound(addressRules(''), 1000)
      await expect(post(host, closed)).rejects.toThrow(OutboundRefused)
      expect(asked).toEqual([])
    },
  )

  it('looks at every address that a name leads to, when it connects', async () => {
    expect(await post('localhost', createOutbound(addressRules('127.0.0.0/8, ::1'), 1000))).toMatchObject({
      status: 200,
    })
    await expect(post('localhost', createOutbound(addressRules('10.0.0.0/8'), 1000))).rejects.toThrow(
      /^localhost leads to (127\.0\.0\.1|::1), which is not an address of the public internet$/,
    )
  })

  it('to a public address goes by https only', async () => {
    await expect(allowing.post('http://8.8.8.8/', {}, '')).rejects.toThrow(
      '8.8.8.8 is public, so it is called by https only',
    )
  })

  it('follows no redirect', async () => {
    answer = (response) => response.writeHead(307, { location: `http://127.0.0.1:${port}/elsewhere` }).end()
    expect(await post('127.0.0.1')).toMatchObject({ status: 307, location: `http://127.0.0.1:${port}/elsewhere` })
    expect(asked.map(({ url }) => url)).toEqual(['/runs'])
  })

  it('ends when no answer comes, or one that never ends', async () => {
    answer = () => {}
    await expect(post('127.0.0.1')).rejects.toThrow('no whole answer within 1 s')
    answer = (response) => response.write('a')
    await expect(post('127.0.0.1')).rejects.toThrow('no whole answer within 1 s')
  })

  it('reads only the beginning of a long answer', async () => {
    answer = (response) => {
      const more = (): void => {
        while (response.write('x'.repeat(65_536)));
        response.once('drain', more)
      }
      more()
    }
    expect((await post('127.0.0.1')).text).toBe('x'.repeat(4096))
  })

  it('says what failed where nothing listens', async () => {
    server.close()
    await expect(post('127.0.0.1')).rejects.toThrow('ECONNREFUSED')
  })
})
