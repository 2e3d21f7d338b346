/**
 * What counting requests costs (`npm run bench:rates`, options in options.ts): requests to cheap routes of the built server
 * with limits and without, in one run and in turn, so that what else the machine does meets both; and the counting by itself
 * in this process. A second server without limits says how far two alike come apart. Times of servers are of Linux.
 */
import { cpSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { cookieOf, ownerOf, serve, setUp } from '../built-server'
import { failed, report } from '../report'
import type { CountingRow } from './counting'
import { measureCounting } from './counting'
import type { RatesOptions } from './options'
import { readOptions, USAGE } from './options'
import type { Times } from './requests'
import { timesOf } from './requests'

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
  const first = await serve(origin, PORT)
  await setUp(first).finally(() => first.stop())
  const servers: Server[] = []
  for (const [k, { limit }] of SERVERS.entries()) {
    const own = join(folder, String(k))
    cpSync(origin, own, { recursive: true })
    const limits = { RATE_LIMIT: limit, RATE_LIMIT_ADDRESS: limit }
    const server = await serve(own, PORT + k, limits)
    servers.push({ ...server, cookie: cookieOf(await ownerOf(server)) })
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

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2))
  const { rounds, requests } = options
  await report(
    'rates',
    options,
    async () => ({ rounds, requestsPerRound: requests, ...(await measureAll(options)) }),
    (measured) => `${tableOf(measured)}\n\nMedians of ${rounds} rounds of ${requests} requests`,
  )
}

await main().catch(failed(USAGE))
