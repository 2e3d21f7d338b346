/**
 * Measures how long files with a million entries take to read, beside plain loops that only cut the same bytes into lines
 * (`npm run bench:reading`, options in options.ts). Both run in a worker thread of a fresh process, in turn; seconds are
 * processor time of the process, memory is its greatest resident size with the file in it.
 */
import { execFileSync, spawnSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus, loadavg } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { isMainThread, Worker, workerData } from 'node:worker_threads'
import { FILES } from './files'
import { measure, type Measured } from './measure'
import { readOptions, USAGE } from './options'
import { rowOf, tableOf } from './summary'

const CHILD = '--child'

function git(...args: string[]): string {
  try {
    return execFileSync('git', args, { encoding: 'utf8' }).trim()
  } catch {
    return 'unknown'
  }
}

/** In the process of one case: the file is made here, and read in a thread. */
function runChild(name: string, entries: number, rounds: number): void {
  const file = FILES.find((candidate) => candidate.name === name)!
  const encoded = new TextEncoder().encode(file.text(entries))
  const bytes = new Uint8Array(new SharedArrayBuffer(encoded.length))
  bytes.set(encoded)
  const worker = new Worker(fileURLToPath(import.meta.url), { workerData: { bytes, rounds } })
  worker.on('message', (measured: Measured) => console.log(JSON.stringify(measured)))
}

function inProcess(name: string, entries: number, rounds: number): Measured {
  const args = ['--enable-source-maps', fileURLToPath(import.meta.url), CHILD, name, String(entries), String(rounds)]
  const { stdout, status, stderr } = spawnSync(process.execPath, args, { encoding: 'utf8', maxBuffer: 2 ** 26 })
  if (status !== 0) throw new Error(`${name}: ${stderr}`)
  return JSON.parse(stdout) as Measured
}

function main(): void {
  const options = readOptions(process.argv.slice(2))
  const before = loadavg()[0]!
  const chosen = FILES.filter(
    ({ name }) => options.only.length === 0 || options.only.some((part) => name.includes(part)),
  )
  const rows = chosen.map((file) => rowOf(file, inProcess(file.name, options.entries, options.rounds)))
  const report = {
    bench: 'reading',
    date: new Date().toISOString(),
    commit: git('rev-parse', '--short', 'HEAD'),
    processor: `${cpus().length} × ${cpus()[0]?.model ?? 'unknown'}`,
    loadBefore: before,
    entries: options.entries,
    rounds: options.rounds,
    rows,
  }
  console.log(options.json ? JSON.stringify(report) : `\n${tableOf(rows)}\n\n${report.processor}`)
  if (before > cpus().length) console.error(`The machine was busy before (load ${before.toFixed(1)}).`)
  if (!options.keep) return
  const folder = join('bench', 'results')
  mkdirSync(folder, { recursive: true })
  const path = join(folder, `${report.date.slice(0, 10)}-${report.commit}-reading.json`)
  writeFileSync(path, `${JSON.stringify(report, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

if (!isMainThread) measure(workerData as { bytes: Uint8Array; rounds: number })
else if (process.argv[2] === CHILD) runChild(process.argv[3]!, Number(process.argv[4]), Number(process.argv[5]))
else if (process.argv.includes('--help')) console.log(USAGE)
else main()
