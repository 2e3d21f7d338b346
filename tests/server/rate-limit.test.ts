import { afterAll, beforeAll, expect, it } from 'vitest'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startServer } from '../support/server'

const CALLER = 40
const ADDRESS = 12
let server: RunningServer
let developer: Client
let cookie: string

beforeAll(async () => {
  const limits = { RATE_LIMIT: String(CALLER), RATE_LIMIT_ADDRESS: String(ADDRESS) }
  server = await startServer({ DEMO: 'true', DATA_DIR: seededFolder(), TRUST_PROXY: 'true', ...limits })
  developer = await Client.signedIn(server.url, 'developer')
  cookie = developer
    .browserCookies()
    .map(({ name, value }) => `${name}=${value}`)
    .join('; ')
})
afterAll(() => server?.stop())

const ask = (path: string, headers: Record<string, string> = {}) => fetch(server.url + path, { headers })
const from = (address: string) => ({ 'x-forwarded-for': address })
const many = async (count: number, headers: Record<string, string>) => {
  const answers = await Promise.all(Array.from({ length: count }, () => ask('/api/problems', headers)))
  return answers.map(({ status }) => status)
}
const counted = (statuses: number[], status: number) => statuses.filter((one) => one === status).length

it('tells each caller how much is left', async () => {
  // The first request finds the session to be good; from the second on it counts by itself.
  await ask('/api/problems', { cookie })
  const answer = await ask('/api/problems', { cookie })
  expect(answer.status).toBe(200)
  expect(answer.headers.get('ratelimit-policy')).toBe(`"caller";q=${CALLER};w=60`)
  expect(answer.headers.get('ratelimit')).toMatch(/^"caller";r=3\d;t=\d+$/)
})

it('refuses tokens that nobody has by address, and leaves members at that address alone', async () => {
  const guesses = Array.from({ length: ADDRESS + 5 }, (_, k) =>
    ask('/api/problems', { ...from('192.0.2.1'), authorization: `Bearer espalier_${k}` }),
  )
  const statuses = (await Promise.all(guesses)).map(({ status }) => status)
  expect(counted(statuses, 401)).toBe(ADDRESS)
  expect(counted(statuses, 429)).toBe(5)
  expect((await ask('/api/session', from('192.0.2.1'))).status).toBe(429)
  expect((await ask('/api/session', from('192.0.2.2'))).status).toBe(401)
  expect((await ask('/api/problems', { ...from('192.0.2.1'), cookie })).status).toBe(200)
})

it('refuses a caller beyond the limit in words, wherever the requests come from, and lets it in again in time', async () => {
  const statuses = [...(await many(CALLER, { cookie })), ...(await many(5, { cookie, ...from('192.0.2.3') }))]
  expect(counted(statuses, 200)).toBeLessThanOrEqual(CALLER + 2)
  const refused = await ask('/api/problems', { cookie })
  expect(refused.status).toBe(429)
  const wait = Number(refused.headers.get('retry-after'))
  expect(wait).toBeGreaterThan(0)
  expect(wait).toBeLessThanOrEqual(2)
  expect(refused.headers.get('ratelimit')).toMatch(/^"caller";r=0;t=\d+$/)
  expect(await refused.json()).toMatchObject({
    data: { code: 'requests.many', message: `More than ${CALLER} requests a minute. Wait ${wait} s and try again.` },
  })
  await new Promise((resolve) => setTimeout(resolve, wait * 1000))
  expect((await ask('/api/problems', { cookie })).status).toBe(200)
})

it('counts neither pages nor the check of health', async () => {
  const pages = Array.from({ length: ADDRESS + 3 }, () => ask('/sign-in', from('192.0.2.4')))
  for (const { status } of await Promise.all(pages)) expect(status).toBe(200)
  const checks = Array.from({ length: ADDRESS + 3 }, () => ask('/api/health', from('192.0.2.4')))
  for (const { status } of await Promise.all(checks)) expect(status).toBe(200)
  expect((await ask('/api/entrance', from('192.0.2.4'))).status).toBe(200)
})
