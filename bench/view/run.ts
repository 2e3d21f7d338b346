/**
 * Measures the lattice view in a browser without a graphics card (`npm run bench:view`, options in options.ts): time to
 * the first picture after the data arrived, and time between frames while the pointer pans and zooms. The page holds the
 * view alone, built from the components as they are, with machines and chains made from a seed.
 */
import { execFileSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus, loadavg } from 'node:os'
import { join } from 'node:path'
import { launch } from '../../tests/support/browser'
import { buildPage } from './build'
import { CASES } from './cases'
import { measureCase } from './measure'
import { readOptions, USAGE } from './options'
import type { ViewOptions } from './options'
import { serve } from './serve'
import { rowOf, tableOf } from './summary'
import type { CaseRow } from './summary'

const VIEWPORT = { width: 1000, height: 900 }

function git(...args: string[]): string {
  try {
    return execFileSync('git', args, { encoding: 'utf8' }).trim()
  } catch {
    return 'unknown'
  }
}

async function measureAll(options: ViewOptions): Promise<CaseRow[]> {
  const site = await serve(await buildPage(process.cwd()))
  const rows: CaseRow[] = []
  try {
    for (const viewCase of CASES.filter(
      ({ name }) => options.only.length === 0 || options.only.some((part) => name.includes(part)),
    )) {
      const rounds = []
      for (let round = 0; round < options.rounds; round++) {
        const browser = await launch()
        const page = await browser.newPage({ viewport: VIEWPORT })
        await page.goto(site.url)
        rounds.push(await measureCase(page, viewCase))
        await browser.close()
      }
      rows.push(rowOf(viewCase, rounds))
      console.error(`${viewCase.name} measured`)
    }
  } finally {
    site.close()
  }
  return rows
}

function keep(report: { readonly date: string; readonly commit: string }): void {
  const folder = join('bench', 'results')
  mkdirSync(folder, { recursive: true })
  const path = join(folder, `${report.date.slice(0, 10)}-${report.commit}-view.json`)
  writeFileSync(path, `${JSON.stringify(report, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2))
  const before = loadavg()[0]!
  const rows = await measureAll(options)
  const report = {
    bench: 'view',
    date: new Date().toISOString(),
    commit: git('rev-parse', '--short', 'HEAD'),
    processor: `${cpus().length} × ${cpus()[0]?.model ?? 'unknown'}`,
    loadBefore: before,
    rounds: options.rounds,
    rows,
  }
  console.log(
    options.json
      ? JSON.stringify(report)
      : `\n${tableOf(rows, CASES)}\n\nMilliseconds; ${report.processor}, no graphics card.`,
  )
  if (before > cpus().length)
    console.error(`The machine was busy (load ${before.toFixed(1)} on ${cpus().length} processors): measure again.`)
  if (options.keep) keep(report)
}

await main().catch((error: unknown) => {
  console.error(error instanceof TypeError || error instanceof RangeError ? `${error.message}\n\n${USAGE}` : error)
  process.exitCode = 1
})
