import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { Client } from '../tests/support/client'
import { startProcess, until } from '../tests/support/server'

const ENTRY = join(process.cwd(), '.output', 'server', 'index.mjs')
const OWNER = { email: 'owner@bench.example', password: 'a library for the bench' }

export interface Running {
  url: string
  pid: number
  output(): string
  stop(): Promise<void>
}

/**
 * Starts the built server on a data folder, without limits on requests where none are given.
 * @throws Error where nothing was built, or when it does not become healthy
 */
export async function serve(folder: string, port: number, settings: Record<string, string> = {}): Promise<Running> {
  if (!existsSync(ENTRY)) throw new Error('There is no built server: run npm run build first.')
  const env = {
    HOST: '127.0.0.1',
    PORT: String(port),
    DATA_DIR: folder,
    NUXT_SESSION_PASSWORD: 'x'.repeat(40),
    ...settings,
  }
  const started = startProcess(ENTRY, env)
  const url = `http://127.0.0.1:${port}`
  const isHealthy = () => {
    if (started.child.exitCode !== null) throw new Error(`the server stopped:\n${started.output()}`)
    return fetch(`${url}/api/health`).then(
      ({ ok }) => ok,
      () => false,
    )
  }
  await until(isHealthy, 300, 'a healthy server')
  return { url, pid: started.child.pid!, output: started.output, stop: () => started.stop() }
}

/** The first account of the installation, with the code that the server prints for it. */
export async function setUp({ url, output }: Running): Promise<void> {
  const code = await until(() => /one-time code: (\S+)/.exec(output())?.[1], 60, 'a set-up code')
  const body = JSON.stringify({ code, workspace: 'Brackwater Ferries', name: 'Owner', ...OWNER })
  const answer = await fetch(`${url}/api/setup`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body,
  })
  if (!answer.ok) throw new Error(`the set-up was refused: ${await answer.text()}`)
}

/** The first account, signed in. */
export async function ownerOf({ url }: Pick<Running, 'url'>): Promise<Client> {
  const client = new Client(url)
  await client.post('/api/session', OWNER)
  return client
}

/** What the browser of somebody signed in sends. */
export const cookieOf = (client: Client): string =>
  client
    .browserCookies()
    .map(({ name, value }) => `${name}=${value}`)
    .join('; ')

/** The most memory that a process has held, MiB (Linux: VmHWM of its status). */
export const peakOf = (pid: number): number =>
  Number(/VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))![1]) / 1024
