/**
 * What exporting and importing a workspace takes (`npm run bench:archive`, options in options.ts): the built server packs
 * workspaces with so many megabytes of samples and takes them in again in another installation, over HTTP. Each step has a
 * server process of its own, so that the most memory it ever held (Linux: VmHWM of its status) is that of the step. What is
 * asked is whether that grows with the workspace.
 */
import { once } from 'node:events'
import { createWriteStream, mkdtempSync, openAsBlob, rmSync, statSync } from 'node:fs'
import type { IncomingMessage } from 'node:http'
import { get } from 'node:http'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pipeline } from 'node:stream/promises'
import { isMainThread, Worker, workerData } from 'node:worker_threads'
import type { Client } from '../../tests/support/client'
import { cookieOf, ownerOf, peakOf, serve, setUp } from '../built-server'
import { failed, report } from '../report'
import { bringIn, fill } from './fill'
import { readOptions, USAGE } from './options'

const PORT = 4876
const PATIENCE_SECONDS = 1200

interface Step {
  readonly seconds: number
  /** Most memory of the server before the step and with it, MiB. */
  readonly before: number
  readonly peak: number
}

interface Row {
  readonly megabytes: number
  readonly archiveMegabytes: number
  readonly export: Step
  /** Of `import` until the archive was received and queued, s. */
  readonly receivedSeconds: number
  readonly import: Step
}

async function measured(dataFolder: string, work: (client: Client) => Promise<void>): Promise<Step> {
  const server = await serve(dataFolder, PORT)
  try {
    const client = await ownerOf(server)
    const before = peakOf(server.pid)
    const start = performance.now()
    await work(client)
    return { seconds: (performance.now() - start) / 1000, before, peak: peakOf(server.pid) }
  } finally {
    await server.stop()
  }
}

/** An installation with its first account, and what is brought into its workspace. */
async function prepare(dataFolder: string, bring: (client: Client) => Promise<void>): Promise<void> {
  const server = await serve(dataFolder, PORT)
  try {
    await setUp(server)
    const client = await ownerOf(server)
    await bring(client)
  } finally {
    await server.stop()
  }
}

/** By a plain request: `fetch` gets slower with every chunk, and would be what is measured. */
async function download(client: Client, path: string): Promise<void> {
  const asked = get(`${client.url}/api/workspaces/export`, { headers: { cookie: cookieOf(client) } })
  const [answer] = (await once(asked, 'response')) as [IncomingMessage]
  if (answer.statusCode !== 200) throw new Error(`the export was answered ${answer.statusCode}`)
  await pipeline(answer, createWriteStream(path))
}

/** @returns seconds until the archive was received */
async function takeIn(client: Client, path: string): Promise<number> {
  const form = new FormData()
  form.append('file', await openAsBlob(path), 'workspace.zip')
  const start = performance.now()
  const { status, body, text } = await client.post<{ jobId: string }>('/api/workspaces/import', form)
  if (status !== 202) throw new Error(`the import was answered ${status}: ${text}`)
  const received = (performance.now() - start) / 1000
  const job = await client.finished(body.jobId, PATIENCE_SECONDS)
  if (job.status !== 'done') throw new Error(`the import ended as ${job.status}: ${job.message}`)
  return received
}

interface Filling {
  dataFolder: string
  bytes: number
  reads: number
}

/**
 * In a thread of its own: what the embedded database leaves in memory would slow the downloading down.
 * @throws what went wrong there
 */
async function filled(filling: Filling): Promise<void> {
  const thread = new Worker(new URL(import.meta.url), { workerData: filling })
  await once(thread, 'exit')
}

async function measure(megabytes: number, reads: number): Promise<Row> {
  const folder = mkdtempSync(join(tmpdir(), 'espalier-bench-'))
  const [from, to, archive] = [join(folder, 'from'), join(folder, 'to'), join(folder, 'workspace.zip')]
  try {
    await prepare(from, (client) => bringIn(client, join(folder, 'files')))
    await prepare(to, () => Promise.resolve())
    await filled({ dataFolder: from, bytes: megabytes * 1e6, reads })
    console.error(`${megabytes} MB of samples stored`)
    const exported = await measured(from, (client) => download(client, archive))
    rmSync(from, { recursive: true })
    let receivedSeconds = 0
    const imported = await measured(to, async (client) => {
      receivedSeconds = await takeIn(client, archive)
    })
    const archiveMegabytes = statSync(archive).size / 1e6
    return { megabytes, archiveMegabytes, export: exported, receivedSeconds, import: imported }
  } finally {
    rmSync(folder, { recursive: true })
  }
}

const stepCells = ({ seconds, before, peak }: Step): string[] => [
  seconds.toFixed(1),
  before.toFixed(0),
  peak.toFixed(0),
]

function tableOf(rows: readonly Row[]): string {
  const head = ['MB', 'ZIP MB', 'export s', 'before MiB', 'peak MiB', 'import s', 'before MiB', 'peak MiB']
  const lines = rows.map((row) => [
    ...[String(row.megabytes), row.archiveMegabytes.toFixed(0)],
    ...stepCells(row.export),
    ...stepCells(row.import),
  ])
  return [head, ...lines].map((line) => line.map((cell) => cell.padStart(12)).join('')).join('\n')
}

async function main(): Promise<void> {
  const { sizes, reads, ...options } = readOptions(process.argv.slice(2))
  const measureAll = async () => {
    const rows: Row[] = []
    for (const megabytes of sizes) rows.push(await measure(megabytes, reads))
    return { reads, rows }
  }
  await report(
    'archive',
    options,
    measureAll,
    ({ rows }) => `${tableOf(rows)}\n\nSets of ${reads} reads of 2,048 qubits`,
  )
}

if (!isMainThread) await fill(workerData as Filling)
else await main().catch(failed(USAGE))
