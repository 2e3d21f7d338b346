/**
 * Measures returned samples as they come in (`npm run bench:returns`, options in options.ts): the same rows in several
 * formats, uploaded to the built server over HTTP until it has read, checked, decoded and stored them, with the most memory
 * that its process took since it started; and how long the page's first request then takes.
 */
import { mkdtempSync, openAsBlob, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Client } from '../../tests/support/client'
import { ownerOf, peakOf, serve, setUp } from '../built-server'
import { failed, report } from '../report'
import { setUpCase, rowsOf } from './case'
import { writeFiles } from './files'
import type { ReturnsOptions } from './options'
import { readOptions, USAGE } from './options'

const PORT = 4871

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
  const folder = mkdtempSync(join(tmpdir(), 'espalier-bench-'))
  const server = await serve(join(folder, 'data'), PORT)
  try {
    await setUp(server)
    const client = await ownerOf(server)
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

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2))
  const { reads, cells, rounds } = options
  const size = { reads, qubits: 8 * cells * cells, rounds }
  await report(
    'returns',
    options,
    async () => ({ ...size, rows: await measureAll(options) }),
    ({ rows }) => `${tableOf(rows)}\n\n${reads} reads of ${size.qubits} qubits`,
  )
}

await main().catch(failed(USAGE))
