/**
 * Measures returned samples as they come in (`npm run bench:returns`, options in options.ts): the same rows in several
 * formats, uploaded to the built server over HTTP until it has read, checked, decoded and stored them, with the most memory
 * that its process took since it started; and how long the page's first request then takes.
 */
import { execFileSync } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, openAsBlob, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { cpus, loadavg, tmpdir } from 'node:os'
import { join } from 'node:path'
import { Client } from '../../tests/support/client'
import { OWNER, serve, setUp } from '../library/seed'
import { setUpCase, rowsOf } from './case'
import { writeFiles } from './files'
import type { ReturnsOptions } from './options'
import { readOptions, USAGE } from './options'

const PORT = 4871
const ENTRY = join(process.cwd(), '.output', 'server', 'index.mjs')

interface Row {
  readonly file: string
  readonly megabytes: number
  /** Seconds of the rounds, the smallest first. */
  readonly upload: number[]
  /** Most memory of the server so far, MiB. */
  readonly peak: number
  /** Seconds of the first request for what the page shows. */
  readonly view: number
}

/** The most memory that a process has held, MiB (Linux: VmHWM of its status). */
const peakOf = (pid: number): number =>
  Number(/VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))![1]) / 1024

async function measureFile(
  { client, pid, runSheetId }: { client: Client; pid: number; runSheetId: string },
  file: { name: string; path: string },
  rounds: number,
): Promise<Row> {
  const upload: number[] = []
  let id = ''
  for (let round = 0; round < rounds; round++) {
    const form = new FormData()
    form.append('file', await openAsBlob(file.path), file.name)
    const start = performance.now()
    const { status, body, text } = await client.post<{ id: string }>(`/api/run-sheets/${runSheetId}/returns`, form)
    if (status !== 201) throw new Error(`${file.name} answered ${status}: ${text}`)
    upload.push((performance.now() - start) / 1000)
    id = body.id
  }
  const start = performance.now()
  await client.get(`/api/returns/${id}`)
  const view = (performance.now() - start) / 1000
  return {
    file: file.name,
    megabytes: statSync(file.path).size / 1e6,
    upload: upload.sort((a, b) => a - b),
    peak: peakOf(pid),
    view,
  }
}

async function measureAll({ reads, cells, rounds }: ReturnsOptions): Promise<Row[]> {
  if (!existsSync(ENTRY)) throw new Error('there is no build: run `npm run build` first')
  const folder = mkdtempSync(join(tmpdir(), 'espalier-bench-'))
  const server = await serve(ENTRY, join(folder, 'data'), PORT)
  try {
    await setUp(server)
    const client = new Client(server.url)
    await client.post('/api/session', OWNER)
    const given = await setUpCase(client, cells)
    const files = writeFiles(folder, given.qubits, rowsOf(given, reads))
    // The server closed idle connections meanwhile; that has to be noticed before one is used again.
    await new Promise((resolve) => setTimeout(resolve, 500))
    const rows: Row[] = []
    for (const file of files)
      rows.push(await measureFile({ client, pid: server.pid, runSheetId: given.runSheetId }, file, rounds))
    return rows
  } finally {
    await server.stop()
    rmSync(folder, { recursive: true })
  }
}

function tableOf(rows: readonly Row[]): string {
  const lines = rows.map(({ file, megabytes, upload, peak, view }) => [
    file,
    megabytes.toFixed(0),
    upload[0]!.toFixed(1),
    upload[Math.floor(upload.length / 2)]!.toFixed(1),
    peak.toFixed(0),
    view.toFixed(2),
  ])
  return [['file', 'MB', 'least s', 'median s', 'peak MiB', 'view s'], ...lines]
    .map((line) => line.map((cell, k) => (k === 0 ? cell.padEnd(16) : cell.padStart(10))).join(''))
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
  const rows = await measureAll(options)
  const { reads, cells, rounds } = options
  const processor = `${processors} × ${cpus()[0]?.model ?? 'unknown'}`
  const date = new Date().toISOString()
  const size = { reads, qubits: 8 * cells * cells, rounds }
  const report = { bench: 'returns', date, commit: commit(), processor, loadBefore: before, ...size, rows }
  console.log(
    options.json
      ? JSON.stringify(report)
      : `\n${tableOf(rows)}\n\n${reads} reads of ${size.qubits} qubits; ${processor}; load ${before.toFixed(1)}.`,
  )
  if (!options.keep) return
  const path = join('bench', 'results', `${date.slice(0, 10)}-${report.commit}-returns.json`)
  mkdirSync(join('bench', 'results'), { recursive: true })
  writeFileSync(path, `${JSON.stringify(report, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

await main().catch((error: unknown) => {
  console.error(error instanceof RangeError ? `${error.message}\n\n${USAGE}` : error)
  process.exitCode = 1
})
