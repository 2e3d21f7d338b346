import { afterAll, beforeAll, expect, it } from 'vitest'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'
import { until } from '../support/server'

interface Entry {
  by: { name: string }
  what: string
  address: string
  thing: { label: string }
}

let server: RunningServer
let owner: Client

beforeAll(async () => {
  server = await startDemo()
  owner = await Client.signedIn(server.url, 'owner')
})
afterAll(() => server?.stop())

const entries = async () =>
  (await owner.get<{ items: Entry[] }>('/api/audit?kind=sign-in')).body.items.map(({ by, what, address }) => [
    by.name,
    what,
    address,
  ])

it('tells who signed in and out, and whose sign-in was refused', async () => {
  const reader = await Client.signedIn(server.url, 'reader')
  await reader.call('DELETE', '/api/session')
  await reader.call('DELETE', '/api/session')
  const wrong = { email: 'reader@brackwater.example', password: 'wrong' }
  expect((await reader.post('/api/session', wrong)).status).toBe(401)
  expect((await reader.post('/api/session', { ...wrong, email: 'nobody@brackwater.example' })).status).toBe(401)
  await until(async () => (await entries()).length > 3, 10, 'the entry of the refusal')
  expect(await entries()).toEqual([
    ['Tomas Reyl', 'was refused at signing in: wrong password', '127.0.0.1'],
    ['Tomas Reyl', 'signed out', '127.0.0.1'],
    ['Tomas Reyl', 'signed in with a password', '127.0.0.1'],
    ['Rhona Skerry', 'signed in with a password', '127.0.0.1'],
  ])
})

it('tells of a password that was chosen by a link', async () => {
  const { items } = (await owner.get<{ items: { id: string; name: string }[] }>('/api/people')).body
  const reader = items.find(({ name }) => name === 'Tomas Reyl')!
  const { link } = (await owner.post<{ link: string }>(`/api/people/${reader.id}/reset-link`)).body
  const chosen = { password: 'quay lantern moss gravel' }
  expect((await new Client(server.url).post(`/api/resets/${link.split('/').at(-1)}`, chosen)).status).toBe(200)
  expect((await entries())[0]).toEqual([
    'Tomas Reyl',
    'chose a new password by a link, which ended all sessions',
    '127.0.0.1',
  ])
})

it('tells of an invitation that was accepted', async () => {
  const invitation = { email: 'nell@example.org', roles: ['reader'] }
  const { link } = (await owner.post<{ link: string }>('/api/invitations', invitation)).body
  const joining = { name: 'Nell Tarn', password: 'lichen wall ferry north' }
  await new Client(server.url).post(`/api/invited/${link.split('/').at(-1)}`, joining)
  expect((await entries())[0]).toEqual(['Nell Tarn', 'accepted an invitation and signed in', '127.0.0.1'])
})
