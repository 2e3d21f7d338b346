import { afterEach, expect, it } from 'vitest'
import { SERVER_ENTRY } from '../../scripts/build.mjs'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startProcess, startServer, temporaryFolder, until } from '../support/server'

const SESSION = { NUXT_SESSION_PASSWORD: 'a-password-of-at-least-thirty-two-characters', ALLOW_PLAIN_HTTP: 'true' }

let server: RunningServer | undefined
afterEach(() => server?.stop())

it('lets the first visitor create the owner with the code on the console, once', async () => {
  server = await startServer({ ...SESSION, DATA_DIR: temporaryFolder() })
  const code = await until(() => /one-time code: (\S+)/.exec(server!.output())?.[1], 10, 'the code')
  expect(server.output()).toContain(`Espalier is ready: ${server.url}`)
  const visitor = new Client(server.url)
  const bare = { setupNeeded: true, demo: false, sendsMail: false, workspace: null, provider: null }
  expect((await visitor.get('/api/entrance')).body).toEqual(bare)
  const person = { workspace: 'Test works', name: 'Ann', email: 'Ann@Example.org', password: 'long enough a password' }
  expect((await visitor.post('/api/setup', { ...person, code: 'wrong' })).status).toBe(403)
  expect((await visitor.post('/api/setup', { ...person, code, password: 'short' })).status).toBe(422)
  expect((await visitor.post('/api/setup', { ...person, code })).status).toBe(201)
  const { body } = await visitor.get<{ roles: string[]; workspace: { name: string } }>('/api/session')
  expect(body.workspace.name).toBe('Test works')
  expect(body.roles).toContain('owner')
  expect((await new Client(server.url).post('/api/setup', { ...person, email: 'b@example.org', code })).status).toBe(
    403,
  )
  const again = new Client(server.url)
  expect((await again.post('/api/session', { email: 'ann@example.org', password: person.password })).status).toBe(200)
})

it('does not start without a session password outside the demo', async () => {
  const started = startProcess(SERVER_ENTRY, { DATA_DIR: temporaryFolder(), PORT: '0' })
  await until(() => started.child.exitCode !== null, 30, 'the refusal')
  expect(started.child.exitCode).toBe(1)
  expect(started.output()).toMatch(/NUXT_SESSION_PASSWORD is not set/)
})

it('does not stay without a port', async () => {
  server = await startServer({ DEMO: 'true', DATA_DIR: seededFolder() })
  const PORT = new URL(server.url).port
  const second = startProcess(SERVER_ENTRY, { DEMO: 'true', DATA_DIR: temporaryFolder(), HOST: '127.0.0.1', PORT })
  await until(() => second.child.exitCode !== null, 30, 'the refusal')
  expect(second.child.exitCode).toBe(1)
  expect(second.output()).toContain(`Port ${PORT} is in use by another program`)
})

it('does not start a second process on the same data folder', async () => {
  const DATA_DIR = seededFolder()
  server = await startServer({ DEMO: 'true', DATA_DIR })
  const second = startProcess(SERVER_ENTRY, { DEMO: 'true', DATA_DIR, PORT: '0' })
  await until(() => second.child.exitCode !== null, 30, 'the refusal')
  expect(second.output()).toMatch(/in use by another process/)
})
