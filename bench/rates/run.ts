/**
 * What counting requests costs (`npm run bench:rates`, options in options.ts): requests to cheap routes of the built server
 * with limits and without, in one run and in turn, so that what else the machine does meets both; and the counting by itself
 * in this process. A second server without limits says how far two alike come apart. Times of servers are of Linux.
 */
import { execFileSync } from 'node:child_process'
import { cpSync, existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { cpus, loadavg, tmpdir } from 'node:os'
import { join } from 'node:path'
import { Client } from '../../tests/support/client'
import { OWNER, serve, setUp } from '../library/seed'
import type { CountingRow } from './counting'
import { measureCounting } from './counting'
import type { RatesOptions } from './options'
import { readOptions, USAGE } from './options'
import type { Times } from './requests'
import { timesOf } from './requests'

const ENTRY = join(process.cwd(), '.output', 'server', 'index.mjs')
const PORT = 4872
/** So high that nothing is refused; without limits for comparison, twice. */
const SERVERS = [
  { name: 'limited', limit: '1000000' },
  { name: 'unlimited', limit: '0' },
  { name: 'unlimited again', limit: '0' },
] as const

type Server = Awaited<ReturnType<typeof serve>> & { cookie: string }

interface RequestRow {
  readonly name: string
  /** Medians over the rounds, ms a request. */
  readonly limited: Times
  readonly unlimited: Times
  /** Medians over the rounds of what the server with limits took against the one without, and of the two alike. */
  readonly ratio: Times
  readonly alike: Times
}

const median = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]!
const medians = (times: readonly Times[]): Times => ({
  wall: median(times.map(({ wall }) => wall)),
  processor: median(times.map(({ processor }) => processor)),
})
const ratios = (of: readonly Times[], to: readonly Times[]): Times =>
  medians(of.map(({ wall, processor }, k) => ({ wall: wall / to[k]!.wall, processor: processor / to[k]!.processor })))

async function startAll(folder: string): Promise<Server[]> {
  const origin = join(folder, 'origin')
  const first = await serve(ENTRY, origin, PORT)
  await setUp(first).finally(() => first.stop())
  const servers: Server[] = []
  for (const [k, { limit }] of SERVERS.entries()) {
    const own = join(folder, String(k))
    cpSync(origin, own, { recursive: true })
    const limits = { RATE_LIMIT: limit, RATE_LIMIT_ADDRESS: limit }
    const server = await serve(ENTRY, own, PORT + k, limits)
    const client = new Client(server.url)
    await client.post('/api/session', OWNER)
    const cookie = client.browserCookies().map(({ name, value }) => `${name}=${value}`)
    servers.push({ ...server, cookie: cookie.join('; ') })
  }
  return servers
}

/** Every server in turn, beginning with another one in each round. */
async function measureRoute(
  name: string,
  servers: readonly Server[],
  { path, status, signedIn }: { path: string; status: number; signedIn: boolean },
  { rounds, requests }: RatesOptions,
): Promise<RequestRow> {
  const times: Times[][] = servers.map(() => [])
  // The first rounds warm the servers up and do not count.
  for (let round = -2; round < rounds; round++)
    for (let turn = 0; turn < servers.length; turn++) {
      const k = (round + 2 + turn) % servers.length
      const headers: Record<string, string> = signedIn ? { cookie: servers[k]!.cookie } : {}
      const taken = await timesOf(servers[k]!, { path, status, headers }, requests)
      if (round >= 0) times[k]!.push(taken)
    }
  const [limited, unlimited, again] = times as [Times[], Times[], Times[]]
  return {
    name,
    limited: medians(limited),
    unlimited: medians(unlimited),
    ratio: ratios(limited, unlimited),
    alike: ratios(again, unlimited),
  }
}

async function measureAll(options: RatesOptions): Promise<{ requests: RequestRow[]; counting: CountingRow[] }> {
  if (!existsSync(ENTRY)) throw new Error('There is no built server: run npm run build first.')
  const folder = mkdtempSync(join(tmpdir(), 'espalier-bench-'))
  let servers: Server[] = []
  try {
    servers = await startAll(folder)
    const session = { path: '/api/session', status: 200, signedIn: true }
    const requests = [
      await measureRoute('who am I, signed in', servers, session, options),
      await measureRoute('refused, not signed in', servers, { ...session, status: 401, signedIn: false }, options),
    ]
    return { requests, counting: measureCounting(servers[0]!.cookie.length, options.rounds) }
  } finally {
    for (const server of servers) await server.stop()
    rmSync(folder, { recursive: true })
  }
}

const line = (cells: readonly string[]): string =>
  cells.map((cell, k) => (k === 0 ? cell.padEnd(40) : cell.padStart(12))).join('')

function tableOf({
  requests,
  counting,
}: {
  requests: readonly RequestRow[]
  counting: readonly CountingRow[]
}): string {
  const rows = requests.flatMap(({ name, limited, unlimited, ratio, alike }) =>
    (['wall', 'processor'] as const).map((kind) => [
      `${name}, ${kind}`,
      limited[kind].toFixed(3),
      unlimited[kind].toFixed(3),
      ratio[kind].toFixed(3),
      alike[kind].toFixed(3),
    ]),
  )
  const bare = counting.map(({ name, least, median }) => [name, least.toFixed(0), median.toFixed(0)])
  return [
    ...[['a request', 'limited ms', 'without ms', 'ratio', 'two alike'], ...rows, []],
    ...[['by itself', 'least ns', 'median ns'], ...bare],
  ]
    .map(line)
    .join('\n')
}

const commit = (): string => {
  try {
    return execFileSync('git', ['rev-parse', '--short', 'HEAD'], { encoding: 'utf8' }).trim()
  } catch {
    return 'unknown'
  }
}

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2))
  const [before, processors] = [loadavg()[0]!, cpus().length]
  const measured = await measureAll(options)
  const { rounds, requests } = options
  const processor = `${processors} × ${cpus()[0]?.model ?? 'unknown'}`
  const date = new Date().toISOString()
  const size = { rounds, requestsPerRound: requests }
  const report = { bench: 'rates', date, commit: commit(), processor, loadBefore: before, ...size, ...measured }
  console.log(
    options.json
      ? JSON.stringify(report)
      : `\n${tableOf(measured)}\n\nMedians of ${rounds} rounds of ${requests} requests; ${processor}; load ${before.toFixed(1)}.`,
  )
  if (!options.keep) return
  const path = join('bench', 'results', `${date.slice(0, 10)}-${report.commit}-rates.json`)
  mkdirSync(join('bench', 'results'), { recursive: true })
  writeFileSync(path, `${JSON.stringify(report, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

await main().catch((error: unknown) => {
  console.error(error instanceof TypeError || error instanceof RangeError ? `${error.message}\n\n${USAGE}` : error)
  process.exitCode = 1
})
