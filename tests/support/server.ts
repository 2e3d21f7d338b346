import type { ChildProcess } from 'node:child_process'
import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync } from 'node:fs'
import { createServer } from 'node:net'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { SERVER_ENTRY, WORKER_ENTRY } from '../../scripts/build.mjs'

export const temporaryFolder = (): string => mkdtempSync(join(tmpdir(), 'espalier-test-'))

export async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1')
  await once(probe, 'listening')
  const { port } = probe.address() as AddressInfo
  probe.close()
  await once(probe, 'close')
  return port
}

export interface RunningServer {
  url: string
  child: ChildProcess
  /** Everything printed so far. */
  output(): string
  /** Sends the signal and waits for the process to end. */
  stop(signal?: NodeJS.Signals): Promise<void>
}

interface Started {
  child: ChildProcess
  output(): string
  stop(signal?: NodeJS.Signals): Promise<void>
}

/** Tests ask more, and from one address, than people and scripts do. */
const NO_LIMITS = { RATE_LIMIT: '0', RATE_LIMIT_ADDRESS: '0' }

/** Starts a Node process with nothing of the surrounding Espalier settings. */
export function startProcess(entry: string, env: Record<string, string>): Started {
  const { DATABASE_URL: _url, DATA_DIR: _dir, DEMO: _demo, NUXT_SESSION_PASSWORD: _password, ...outer } = process.env
  const child = spawn(process.execPath, [entry], {
    env: { ...outer, ...NO_LIMITS, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let text = ''
  child.stdout.on('data', (chunk: Buffer) => (text += chunk.toString()))
  child.stderr.on('data', (chunk: Buffer) => (text += chunk.toString()))
  return {
    child,
    output: () => text,
    async stop(signal = 'SIGTERM') {
      if (child.exitCode !== null || child.signalCode !== null) return
      child.kill(signal)
      await once(child, 'exit')
    },
  }
}

export const startWorker = (env: Record<string, string>): Started => startProcess(WORKER_ENTRY, env)

/** Waits until `look` answers something, or fails with what was printed. */
export async function until<T>(
  look: () => Promise<T | undefined | false> | T | undefined | false,
  seconds = 60,
  what = 'it',
): Promise<T> {
  const end = Date.now() + seconds * 1000
  for (;;) {
    const value = await look()
    if (value) return value
    if (Date.now() > end) throw new Error(`${what} did not happen within ${seconds} s`)
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
}

/** Starts the built server on a free port and waits until it is healthy. */
export async function startServer(env: Record<string, string>): Promise<RunningServer> {
  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  const started = startProcess(SERVER_ENTRY, { HOST: '127.0.0.1', PORT: String(port), ...env })
  const healthy = async (): Promise<boolean> => {
    if (started.child.exitCode !== null) throw new Error(`the server stopped:\n${started.output()}`)
    return fetch(`${url}/api/health`).then(
      (response) => response.ok,
      () => false,
    )
  }
  await until(healthy, 90, 'a healthy server')
  return { url, ...started }
}
