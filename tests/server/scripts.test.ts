import { execFile, spawn, spawnSync } from 'node:child_process'
import { resolve } from 'node:path'
import { promisify } from 'node:util'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { freePort, startServer, until } from '../support/server'

const folder = resolve(import.meta.dirname, '../../docs/scripts')
const runs = (command: string, ...args: string[]): boolean => spawnSync(command, args).status === 0
const hasCurl = runs('bash', '-c', 'command -v curl awk sed od')
const hasPython = runs('python3', '-c', '')
const hasNumPy = runs('python3', '-c', 'import numpy')

let server: RunningServer
let tokens: { ESPALIER_TOKEN: string; ESPALIER_REVIEWER_TOKEN: string }

const tokenOf = async (role: string): Promise<string> => {
  const client = await Client.signedIn(server.url, role)
  return (await client.post<{ token: string }>('/api/tokens', { name: 'script', role })).body.token
}

beforeAll(async () => {
  server = await startServer({ DEMO: 'true', DATA_DIR: seededFolder(), BRIDGE_PRIVATE_ADDRESSES: '127.0.0.1' })
  tokens = { ESPALIER_TOKEN: await tokenOf('developer'), ESPALIER_REVIEWER_TOKEN: await tokenOf('reviewer') }
})
afterAll(() => server?.stop())

async function output(command: string, file: string, env: Record<string, string>): Promise<string> {
  const settings = { env: { ...process.env, ESPALIER_URL: server.url, ...env }, timeout: 60_000 }
  return (await promisify(execFile)(command, [resolve(folder, file)], settings)).stdout
}

it.skipIf(!hasCurl)('runs the ring of docs/scripts/run.sh to its optimum (needs bash, curl and awk)', async () => {
  const [head, best] = (await output('bash', 'run.sh', tokens)).trim().split('\n')
  const labels = head!.split(',')
  const values = best!.split(',')
  const of = (name: string): number => Number(values[labels.indexOf(name)])
  const spins = Array.from({ length: 8 }, (_, i) => of(`s${i}`))
  expect(spins.every((spin, i) => spin === -spins[(i + 1) % 8]!)).toBe(true)
  expect(of('energy')).toBe(-8.5)
})

it.skipIf(!hasNumPy)('runs the spins of docs/scripts/run.py to their optimum (needs Python 3 with NumPy)', async () => {
  const lines = (await output('python3', 'run.py', tokens)).trim().split('\n')
  const energy = Number(/^Energy (\S+), found \d+ times in 100 reads:$/.exec(lines[0]!)![1])
  const spins = new Map(lines.slice(1).map((line) => [line.split(' ')[0]!, Number(line.split(' ')[1])]))
  const developer = await Client.signedIn(server.url, 'developer')
  const { items } = (await developer.get<{ items: { id: string; name: string }[] }>('/api/problems')).body
  const { id } = items.find(({ name }) => name === 'Twelve spins')!
  const text = await developer.download(`/api/problems/${id}/coefficients?form=ising&format=csv`)
  const couplings = new TextDecoder()
    .decode(text.bytes)
    .split('\n')
    .map((line) => line.split(','))
    .filter(([i, j]) => spins.has(i!) && spins.has(j!))
    .map(([i, j, value]) => [i!, j!, Number(value)] as const)
  const energyOf = (at: (label: string) => number) => couplings.reduce((sum, [i, j, v]) => sum + v * at(i) * at(j), 0)
  const labels = [...spins.keys()]
  const all = Array.from({ length: 2 ** labels.length }, (_, bits) =>
    energyOf((label) => (bits & (1 << labels.indexOf(label)) ? 1 : -1)),
  )
  expect(labels.length).toBe(12)
  expect(energyOf((label) => spins.get(label)!)).toBe(energy)
  expect(energy).toBe(Math.min(...all))
})

it.skipIf(!hasNumPy)('says who has to approve where there is no token of a reviewer, and goes on later', async () => {
  const { ESPALIER_TOKEN } = tokens
  const said = await output('python3', 'run.py', { ESPALIER_TOKEN })
  const [, id] = /set RUN_SHEET=(\S+)\.$/.exec(said.trim())!
  const reviewer = await Client.signedIn(server.url, 'reviewer')
  expect((await reviewer.post(`/api/run-sheets/${id}/approve`, {})).status).toBe(200)
  expect(await output('python3', 'run.py', { ESPALIER_TOKEN, RUN_SHEET: id! })).toMatch(/^Energy -\d/)
})

type Sheet = { state: string; call: { state: string } | null; returns: { reads: number; byBridge: boolean }[] }
type Item = { id: string; state?: string; name: string }

it.skipIf(!hasPython)(
  'sends a run sheet to docs/scripts/bridge.py and gets its samples back (needs Python 3)',
  async () => {
    const [developer, reviewer, steward] = await Promise.all(
      ['developer', 'reviewer', 'steward'].map((name) => Client.signedIn(server.url, name)),
    )
    const { items: machines } = (await steward!.get<{ items: Item[] }>('/api/machines')).body
    const bridgePath = `/api/machines/${machines.find(({ name }) => name === 'Juniper')!.id}/bridge`
    const port = await freePort()
    const own = { kind: 'own', url: `http://127.0.0.1:${port}/` }
    const { made } = (await steward!.call<{ made: { secret: string } }>('PUT', bridgePath, own)).body
    const env = { ...process.env, BRIDGE_SECRET: made.secret, BRIDGE_PORT: String(port) }
    const bridge = spawn('python3', [resolve(folder, 'bridge.py')], { env, stdio: 'ignore' })
    const tried = async () => (await steward!.post<{ isAnswered: boolean }>(`${bridgePath}/test`)).body.isAnswered
    try {
      await until(tried, 20, 'an answer of the bridge')
      const refused = await fetch(own.url, { method: 'POST', body: '{"event":"test"}' })
      expect(refused.status).toBe(401)
      const { items } = (await reviewer!.get<{ items: Item[] }>('/api/run-sheets')).body
      const { id } = items.find(({ state }) => state === 'in review')!
      await reviewer!.post(`/api/run-sheets/${id}/approve`, {})
      expect((await developer!.post(`/api/run-sheets/${id}/issue`, { byBridge: true })).status).toBe(200)
      const shown = async () => (await developer!.get<Sheet>(`/api/run-sheets/${id}`)).body
      await until(async () => (await shown()).state === 'returned', 60, 'samples by the bridge')
      expect(await shown()).toMatchObject({ call: { state: 'returned' }, returns: [{ reads: 400, byBridge: true }] })
    } finally {
      bridge.kill()
    }
  },
)
