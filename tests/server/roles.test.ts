import Ajv2020 from 'ajv/dist/2020.js'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { insertPasskey } from '../../server/database/repositories/passkeys'
import { users, workspaces } from '../../server/database/schema'
import { createAccount, createWorkspace } from '../../server/services/people'
import type { Role } from '../../shared/schemas/common'
import { ROLES } from '../../shared/schemas/common'
import document from '../../docs/openapi.json'
import { startTestApp } from '../support/app'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startServer } from '../support/server'
import type { Sample, Things } from './route-requests'
import { ID_OF, SAMPLES } from './route-requests'

/** A route as the document made from its file has it. */
interface Route {
  name: string
  method: string
  path: string
  allowed: 'anybody' | 'member' | Role[]
  sessionOnly: boolean
  answers: Record<string, { content?: Record<string, unknown> }>
}

interface Caller {
  name: string
  role: Role | null
  isToken: boolean
  headers: Record<string, string>
}

type Operations = Record<string, { 'x-allowed': string | string[]; security: object[]; responses: object }>

const ROUTES: Route[] = Object.entries(document.paths as unknown as Record<string, Operations>).flatMap(
  ([path, operations]) =>
    Object.entries(operations).map(([method, operation]) => ({
      name: `${method.toUpperCase()} ${path}`,
      method: method.toUpperCase(),
      path,
      allowed: operation['x-allowed'] as Route['allowed'],
      sessionOnly: operation.security.length === 1 && 'session' in operation.security[0]!,
      answers: operation.responses as Route['answers'],
    })),
)
const CLOSED = ROUTES.filter(({ allowed }) => allowed !== 'anybody')

let server: RunningServer
let own: Caller[]
let elsewhere: Caller[]
/** Things of the workspace that `own` belong to. */
let things: Things

const may = (route: Route, { role, isToken }: Caller): boolean =>
  role !== null && (route.allowed === 'member' || route.allowed.includes(role)) && !(isToken && route.sessionOnly)

/** One account of each role in the demo workspace, and one of each in another; all with the password of the demo. */
async function addAccounts(folder: string): Promise<void> {
  const test = await startTestApp(1, folder, { userId: '-', workspaceId: '-' })
  const { app } = test
  const [demo] = await app.db.select().from(workspaces)
  const passwordHash = (await app.db.select().from(users))[0]!.passwordHash!
  await app.db.transaction(async (tx) => {
    const other = await createWorkspace(app, tx, 'Elsewhere')
    const passkey = { id: 'tried', credentialId: 'tried', name: 'Tried', publicKey: '', counter: 0, backedUp: false }
    for (const [place, workspaceId] of Object.entries({ own: demo!.id, elsewhere: other }))
      for (const name of [...ROLES, 'spare'] as const) {
        const email = `${place}.${name}@brackwater.example`
        const roles: Role[] = name === 'spare' ? ['reader'] : [name]
        const account = { name: `${place} ${name}`, email, passwordHash, workspaceId, roles }
        const userId = await createAccount(app, tx, account)
        if (account.name === 'own owner')
          await insertPasskey(tx, { ...passkey, userId, transports: [], createdAt: app.now(), usedAt: null })
      }
  })
  await test.close()
}

async function callers(place: string): Promise<Caller[]> {
  const made = ROLES.map(async (role): Promise<Caller[]> => {
    const client = await Client.signedIn(server.url, `${place}.${role}`)
    const { body } = await client.post<{ token: string }>('/api/tokens', { name: 'Tried', role })
    const cookie = client.browserCookies().map(({ name, value }) => `${name}=${value}`)
    const authorization = `Bearer ${body.token}`
    return [
      { name: `${place} ${role}`, role, isToken: false, headers: { cookie: cookie.join('; ') } },
      { name: `${place} ${role}'s token`, role, isToken: true, headers: { authorization } },
    ]
  })
  return (await Promise.all(made)).flat()
}

interface Item {
  id: string
  name?: string
  isThis?: boolean
  state?: string
}

const ownId = async (client: Client): Promise<string> =>
  (await client.get<{ person: Item }>('/api/session')).body.person.id

/** Things that no caller of the test depends on, so that they may be deleted. */
async function thingsOf(owner: Client, developer: Client): Promise<Things> {
  const list = async (path: string): Promise<Item[]> => (await owner.get<{ items: Item[] }>(path)).body.items
  const made = async (path: string, body?: unknown): Promise<Item & { jobId: string }> =>
    (await developer.post<Item & { jobId: string }>(path, body)).body
  const returned = (await list('/api/run-sheets')).find(({ state }) => state === 'returned')!
  type Sheet = Record<'embedding' | 'machine' | 'problem', Item> & { returns: Item[] }
  const sheet = (await owner.get<Sheet>(`/api/run-sheets/${returned.id}`)).body
  const [problemId, machineId] = [sheet.problem.id, sheet.machine.id]
  const { chains } = (await owner.get<{ chains: object }>(`/api/embeddings/${sheet.embedding.id}`)).body
  const embedding = await made('/api/embeddings/import', { problemId, machineId, chains })
  const runSheet = await made(`/api/run-sheets/${returned.id}/duplicate`)
  const scan = await made(`/api/run-sheets/${runSheet.id}/scans`, { strengths: [1, 2], reads: 10, sweeps: 10 })
  await developer.finished(scan.jobId)
  const invited = await owner.post<Item>('/api/invitations', { email: 'invited@example.org', roles: ['reader'] })
  const token = await owner.post<Item>('/api/tokens', { name: 'Nobody’s', role: 'owner' })
  const spare = await Client.signedIn(server.url, 'own.owner')
  const sessions = (await spare.get<{ items: Item[] }>('/api/sessions')).body.items
  const reviewer = (await list('/api/people')).find(({ name }) => name === 'own reviewer')!
  const steward = (await list('/api/people')).find(({ name }) => name === 'own steward')!
  const absence = { forId: reviewer.id, byId: steward.id, startsOn: '2099-02-01', endsOn: '2099-02-02' }
  const standIn = (await owner.post<Item>('/api/stand-ins', absence)).body
  const person = (await list('/api/people')).find(({ name }) => name === 'own spare')!
  await developer.post(`/api/run-sheets/${runSheet.id}/remarks`, { remark: `Seen by @[${await ownId(owner)}]?` })
  return {
    ...{ standIn: standIn.id, reviewer: reviewer.id, newsItem: (await list('/api/news'))[0]!.id },
    ...{ person: person.id, problem: problemId, machine: machineId, embedding: embedding.id, runSheet: runSheet.id },
    ...{ return: sheet.returns[0]!.id, scan: scan.id, job: scan.jobId, invitation: invited.body.id },
    ...{ token: token.body.id, session: sessions.find(({ isThis }) => isThis)!.id },
    passkey: (await list('/api/account/passkeys'))[0]!.id,
    workspace: (await owner.get<{ workspace: Item }>('/api/session')).body.workspace.id,
  }
}

beforeAll(async () => {
  const folder = seededFolder()
  await addAccounts(folder)
  server = await startServer({ DEMO: 'true', DATA_DIR: folder })
  own = await callers('own')
  things = await thingsOf(
    await Client.signedIn(server.url, 'own.owner'),
    await Client.signedIn(server.url, 'own.developer'),
  )
  elsewhere = await callers('elsewhere')
})
afterAll(() => server?.stop())

const filled = (text: string, ids: Record<string, string>): string =>
  text.replace(/\$(\w+)/g, (_, name: string) => ids[name] ?? name)

/** Whether a request names a thing of a workspace. */
const names = ({ path }: Route, sample: Sample): boolean =>
  path.includes('{') || (JSON.stringify(sample) ?? '').includes('$')

function addressOf({ path }: Route, { query }: Sample, ids: Record<string, string>): string {
  const address = path.replace(
    /([\w-]+)\/\{\w+\}/g,
    (_, owner: string) => `${owner}/${ids[ID_OF[owner]!] ?? 'unknown'}`,
  )
  return query ? `${address}?${filled(query, ids)}` : address
}

function bodyOf({ json, form }: Sample, ids: Record<string, string>): BodyInit | undefined {
  if (json !== undefined) return filled(JSON.stringify(json), ids)
  if (!form) return undefined
  const parts = new FormData()
  for (const [name, value] of Object.entries(form)) parts.append(name, value)
  parts.append('file', new Blob(['a b 1\n']), 'lines.txt')
  return parts
}

async function ask(route: Route, caller: Caller | null, ids: Record<string, string>, body?: BodyInit) {
  const sample = SAMPLES[route.name]!
  const sent: Record<string, string> = typeof body === 'string' ? { 'content-type': 'application/json' } : {}
  const response = await fetch(server.url + addressOf(route, sample, ids), {
    method: route.method,
    headers: { ...caller?.headers, ...sent },
    body,
  })
  const type = response.headers.get('content-type') ?? ''
  if (sample.isEndless && response.ok) await response.body!.cancel()
  return { status: response.status, type, text: response.bodyUsed ? '' : await response.text() }
}

/** Runs a few at a time, and gathers what each finds wrong. */
async function complaints<T>(tasks: T[], look: (task: T) => Promise<string | null>): Promise<string[]> {
  const found: string[] = []
  const waiting = [...tasks]
  const work = async (): Promise<void> => {
    for (let task = waiting.shift(); task !== undefined; task = waiting.shift()) {
      const complaint = await look(task)
      if (complaint) found.push(complaint)
    }
  }
  await Promise.all(Array.from({ length: 8 }, work))
  return found.sort()
}

const pairs = (callers: Caller[]) => CLOSED.flatMap((route) => callers.map((caller) => ({ route, caller })))
const changes = ({ method }: Route): boolean => method !== 'GET'

/** A request that is let in if its sender is, and then changes nothing. */
function harmless(route: Route): { ids: Record<string, string>; body?: string } {
  if (!changes(route)) return { ids: things }
  const { json, form } = SAMPLES[route.name]!
  return json === undefined && !form ? { ids: {} } : { ids: things, body: '{' }
}

describe('every route', () => {
  it('has a request here to try it with', () => {
    expect(ROUTES.map(({ name }) => name).sort()).toEqual(Object.keys(SAMPLES).sort())
  })

  it('lets readers change nothing', () => {
    const open = CLOSED.filter(
      (route) => changes(route) && (route.allowed === 'member' || route.allowed.includes('reader')),
    )
    expect(open.map(({ name }) => name).sort()).toEqual([
      'DELETE /api/account',
      'DELETE /api/account/identity',
      'DELETE /api/account/membership',
      'DELETE /api/account/passkeys/{id}',
      'DELETE /api/sessions',
      'DELETE /api/sessions/{id}',
      'DELETE /api/tokens/{id}',
      'PATCH /api/account/passkeys/{id}',
      'POST /api/account/address',
      'POST /api/account/identity',
      'POST /api/account/membership',
      'POST /api/account/passkeys',
      'POST /api/account/passkeys/challenge',
      'POST /api/news/read',
      'POST /api/news/{id}/read',
      'POST /api/problems/{id}/energy',
      'POST /api/problems/{id}/lift',
      'POST /api/problems/{id}/presolve',
      'POST /api/run-sheets/{id}/spins',
      'POST /api/tokens',
      'POST /api/workspaces',
      'POST /api/workspaces/import',
      'PUT /api/account/mails',
      'PUT /api/account/password',
      'PUT /api/session/workspace',
    ])
  })

  it('answers 401 to whoever is not signed in, and to anybody what is public', async () => {
    expect(
      await complaints(ROUTES, async (route) => {
        const sample = SAMPLES[route.name]!
        const expected = route.allowed === 'anybody' ? sample.status : 401
        const { status } = await ask(route, null, things, bodyOf(sample, things))
        return status === expected ? null : `${route.name}: ${status} instead of ${expected}`
      }),
    ).toEqual([])
  })

  it('answers as the document says', async () => {
    const ajv = new Ajv2020({ strict: false, validateFormats: false, validateSchema: false })
    ajv.addSchema(document, 'document')
    const pointer = (...parts: string[]) => parts.map((part) => part.replace(/~/g, '~0').replace(/\//g, '~1')).join('/')
    const owner = own.find(({ role, isToken }) => role === 'owner' && !isToken)!
    const reads = CLOSED.filter((route) => !changes(route) && may(route, owner))
    expect(
      await complaints(reads, async (route) => {
        const { status, type, text } = await ask(route, owner, things)
        const media = type.split(';')[0]!
        const answer = route.answers[String(status)]
        if (answer && (status >= 400 || answer.content?.['*/*'])) return null
        if (!answer?.content?.[media]) return `${route.name}: ${status} ${media} is not in the document`
        if (media !== 'application/json') return null
        const at = pointer(
          'paths',
          route.path,
          route.method.toLowerCase(),
          'responses',
          String(status),
          'content',
          media,
        )
        const isAsSaid = ajv.compile({ $ref: `document#/${at}/schema` })
        return isAsSaid(JSON.parse(text)) ? null : `${route.name}: ${ajv.errorsText(isAsSaid.errors)}`
      }),
    ).toEqual([])
  })

  it('answers 404 to another workspace, 403 where the role is missing as well', async () => {
    const naming = pairs(elsewhere).filter(({ route }) => names(route, SAMPLES[route.name]!))
    expect(
      await complaints(naming, async ({ route, caller }) => {
        const expected = may(route, caller) ? 404 : 403
        const { status } = await ask(route, caller, things, bodyOf(SAMPLES[route.name]!, things))
        return status === expected ? null : `${route.name} by ${caller.name}: ${status} instead of ${expected}`
      }),
    ).toEqual([])
  })

  it('finds the same things in their own workspace', async () => {
    const found: string[] = []
    for (const name of Object.keys(SAMPLES)) {
      const route = CLOSED.find((one) => one.name === name)
      if (!route || SAMPLES[name]!.endsCaller) continue
      const caller = own.find((one) => !one.isToken && one.role === 'owner' && may(route, one))
      const sender = caller ?? own.find((one) => may(route, one))!
      const { status, text } = await ask(route, sender, things, bodyOf(SAMPLES[name]!, things))
      if ([400, 401, 403, 404].includes(status) || status >= 500) found.push(`${name}: ${status} ${text.slice(0, 200)}`)
    }
    expect(found).toEqual([])
  })

  it('answers 403 to a role or a token that may not, and lets the others in', async () => {
    expect(
      await complaints(pairs(own), async ({ route, caller }) => {
        if (SAMPLES[route.name]!.endsCaller && may(route, caller)) return null
        const { ids, body } = harmless(route)
        const { status } = await ask(route, caller, ids, body)
        const isIn = status !== 401 && status !== 403 && (status !== 404 || ids !== things)
        if (may(route, caller) ? isIn : status === 403) return null
        return `${route.name} by ${caller.name}: ${status}`
      }),
    ).toEqual([])
  })
})

it.each([
  ['GET', '/api/problem'],
  ['POST', '/api/problems/x/nothing?page=1'],
  ['DELETE', '/api/problems'],
])('says that there is no route for %s %s, to whoever asks', async (method, path) => {
  for (const headers of [{}, own[0]!.headers]) {
    const response = await fetch(server.url + path, { method, headers, redirect: 'manual' })
    expect(response.status).toBe(404)
    expect(response.headers.get('content-type')).toContain('application/json')
    const message = `There is no ${method} ${path.split('?')[0]}. All routes are at /reference.`
    expect(((await response.json()) as { data: unknown }).data).toEqual({ code: 'route.none', message })
  }
})
