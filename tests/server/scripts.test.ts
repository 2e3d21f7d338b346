import { execFile, spawnSync } from 'node:child_process'
import { resolve } from 'node:path'
import { promisify } from 'node:util'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

const folder = resolve(import.meta.dirname, '../../docs/scripts')
const runs = (command: string, ...args: string[]): boolean => spawnSync(command, args).status === 0
const hasCurl = runs('bash', '-c', 'command -v curl awk sed od')
const hasNumPy = runs('python3', '-c', 'import numpy')

let server: RunningServer
let tokens: { ESPALIER_TOKEN: string; ESPALIER_REVIEWER_TOKEN: string }

const tokenOf = async (role: string): Promise<string> => {
  const client = await Client.signedIn(server.url, role)
  return (await client.post<{ token: string }>('/api/tokens', { name: 'script', role })).body.token
}

beforeAll(async () => {
  server = await startDemo()
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
