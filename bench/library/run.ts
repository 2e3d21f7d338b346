/**
 * Measures the library of problems as people meet it (`npm run bench:library`, options in options.ts): the list route of
 * the built server over HTTP, and in a browser the time until the page of the library shows its rows, and until it shows
 * others after a click on a heading. All of it at the number of problems given, in every state of the work.
 */
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { launch } from '../../tests/support/browser'
import type { Client } from '../../tests/support/client'
import { ownerOf, serve, setUp } from '../built-server'
import { failed, report } from '../report'
import type { LibraryOptions } from './options'
import { readOptions, USAGE } from './options'
import { REQUESTS } from './requests'
import { fill } from './seed'

const PORT = 4870
const ROWS = 100
const VIEWPORT = { width: 1280, height: 900 }

interface Row {
  readonly name: string
  /** Problems that match; null for pages. */
  readonly found: number | null
  readonly median: number
  readonly worst: number
}

function rowOf(name: string, found: number | null, times: readonly number[]): Row {
  const sorted = [...times].sort((a, b) => a - b)
  return { name, found, median: sorted[Math.floor(sorted.length / 2)]!, worst: sorted.at(-1)! }
}

async function measureRequests(client: Client, rounds: number): Promise<Row[]> {
  const rows: Row[] = []
  const paths = REQUESTS.map(({ name, query }) => ({ name, path: `/api/problems?limit=${ROWS}&${query}` }))
  for (const { name, path } of [...paths, { name: 'states and tags counted', path: '/api/problems/summary' }]) {
    const times: number[] = []
    let found = 0
    // The first one warms the database's caches up and does not count.
    for (let round = 0; round <= rounds; round++) {
      const start = performance.now()
      const { status, body } = await client.get<{ total: number }>(path)
      if (status !== 200) throw new Error(`${path} answered ${status}`)
      found = body.total
      if (round > 0) times.push(performance.now() - start)
    }
    rows.push(rowOf(name, found, times))
  }
  return rows
}

async function measurePages(client: Client, url: string, rounds: number): Promise<Row[]> {
  const browser = await launch()
  const [shown, sorted]: [number[], number[]] = [[], []]
  try {
    for (let round = 0; round <= rounds; round++) {
      const context = await browser.newContext({ viewport: VIEWPORT })
      await context.addCookies(client.browserCookies())
      const page = await context.newPage()
      const start = performance.now()
      await page.goto(url)
      await page
        .locator('tbody tr')
        .nth(ROWS - 1)
        .waitFor()
      const seen = performance.now()
      await page.waitForLoadState('networkidle')
      const first = await page.locator('tbody tr th').first().textContent()
      const clicked = performance.now()
      await page.getByRole('button', { name: 'Variables' }).click()
      await page.waitForFunction((was) => document.querySelector('tbody tr th')?.textContent !== was, first)
      if (round > 0) {
        shown.push(seen - start)
        sorted.push(performance.now() - clicked)
      }
      await context.close()
    }
  } finally {
    await browser.close()
  }
  return [rowOf('page: rows shown', null, shown), rowOf('page: sorted by a heading', null, sorted)]
}

async function measureAll({ problems, rounds }: LibraryOptions): Promise<Row[]> {
  const folder = mkdtempSync(join(tmpdir(), 'espalier-bench-'))
  try {
    const empty = await serve(folder, PORT)
    await setUp(empty).finally(() => empty.stop())
    await fill(folder, problems)
    console.error(`${problems} problems seeded`)
    const server = await serve(folder, PORT)
    try {
      const client = await ownerOf(server)
      return [...(await measureRequests(client, rounds)), ...(await measurePages(client, server.url, rounds))]
    } finally {
      await server.stop()
    }
  } finally {
    rmSync(folder, { recursive: true })
  }
}

function tableOf(rows: readonly Row[]): string {
  const lines = rows.map(({ name, found, median, worst }) => [name, found ?? '', median.toFixed(0), worst.toFixed(0)])
  const widths = [28, 8, 8, 8]
  return [['what', 'found', 'median', 'worst'], ...lines]
    .map((line) =>
      line.map((cell, k) => (k === 0 ? String(cell).padEnd(widths[k]!) : String(cell).padStart(widths[k]!))).join(''),
    )
    .join('\n')
}

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2))
  const { problems, rounds } = options
  await report(
    'library',
    options,
    async () => ({ problems, rounds, rows: await measureAll(options) }),
    ({ rows }) => `${tableOf(rows)}\n\nMilliseconds at ${problems} problems`,
  )
}

await main().catch(failed(USAGE))
