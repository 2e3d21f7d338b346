/**
 * Measures the embedding engine against the baseline on the same instances (`npm run bench:embedding`, options in
 * options.ts). Every row runs in a process of its own. All seconds are processor time, all threads together.
 */
import { execFileSync, spawn } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus } from 'node:os'
import { join } from 'node:path'
import { createInterface } from 'node:readline'
import { runBaseline, runEngine } from './measure'
import type { Run } from './measure'
import { readOptions, USAGE } from './options'
import type { BenchOptions } from './options'
import { MEMORY_ROWS, ROWS } from './rows'
import type { Row } from './rows'
import { lineOf, resultOf, tableOf } from './summary'
import type { RowResult } from './summary'

/** Seeds after which the baseline is left out of a row when none of them found anything. */
const HOPELESS_SEEDS = 3

/** Time limit of a row with --quick. */
const QUICK_SECONDS = 5

type Message =
  { readonly side: 'engine' | 'baseline'; readonly run: Run } | { readonly growth: number; readonly peak: number }

const send = (message: Message): void => console.log(JSON.stringify(message))
const limitOf = (row: Row, { seconds, quick }: BenchOptions): number =>
  seconds ?? (quick ? Math.min(QUICK_SECONDS, row.timeLimitSeconds) : row.timeLimitSeconds)

function measureTimes(row: Row, options: BenchOptions): void {
  const limit = limitOf(row, options)
  for (let seed = 1; seed <= options.seeds; seed++) send({ side: 'engine', run: runEngine(row, seed, limit, options) })
  if (!options.baseline) return
  let found = 0
  for (let seed = 1; seed <= options.seeds && (found > 0 || seed <= HOPELESS_SEEDS); seed++) {
    const run = runBaseline(row, seed, limit)
    if (run.found) found++
    send({ side: 'baseline', run })
  }
}

/** Growth of resident memory from the built instance to the peak, and the peak itself, in MiB. */
function measureMemory(row: Row, options: BenchOptions): void {
  const task = row.make(1)
  const before = process.memoryUsage().rss / 2 ** 20
  const run = runEngine({ ...row, make: () => task }, 1, limitOf(row, options), options)
  const peak = process.resourceUsage().maxRSS / 2 ** 10
  send({ side: 'engine', run })
  send({ growth: peak - before, peak })
}

/** Runs this program once more for one row, and gives what it sends. */
async function messagesOf(row: Row, args: readonly string[]): Promise<Message[]> {
  const child = spawn(process.execPath, [process.argv[1]!, ...args, '--child', row.name], {
    stdio: ['ignore', 'pipe', 'inherit'],
  })
  const messages: Message[] = []
  const ended = new Promise<number | null>((resolve) => child.on('close', resolve))
  for await (const line of createInterface({ input: child.stdout })) messages.push(JSON.parse(line) as Message)
  const status = await ended
  if (status !== 0) throw new Error(`measuring ${row.name} ended with status ${status}`)
  return messages
}

const runsOf = (messages: readonly Message[], side: 'engine' | 'baseline'): Run[] =>
  messages.flatMap((message) => ('side' in message && message.side === side ? [message.run] : []))

function git(...args: string[]): string {
  try {
    return execFileSync('git', args, { encoding: 'utf8' }).trim()
  } catch {
    return 'unknown'
  }
}

function circumstances(options: BenchOptions): object {
  return {
    bench: options.memory ? 'embedding memory' : 'embedding',
    date: new Date().toISOString(),
    commit: git('rev-parse', '--short', 'HEAD'),
    changed: git('status', '--porcelain', '--', 'shared/engine', 'bench') !== '',
    node: process.version,
    processor: cpus()[0]?.model ?? 'unknown',
    time: 'processor seconds, all threads of the process',
    seeds: options.seeds,
    method: options.method,
    tries: options.tries,
  }
}

function finish(report: { commit?: string; date?: string }, table: string, options: BenchOptions): void {
  const text = JSON.stringify(report)
  console.log(options.json ? text : `\n${table}\n\nTimes are processor seconds, all threads of a process together.`)
  if (!options.keep) return
  const folder = join('bench', 'results')
  mkdirSync(folder, { recursive: true })
  const path = join(folder, `${report.date!.slice(0, 10)}-${report.commit}${options.memory ? '-memory' : ''}.json`)
  writeFileSync(path, `${JSON.stringify(report, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

const isWanted = ({ name, quick }: Row, options: BenchOptions): boolean =>
  (!options.quick || quick) && (options.only.length === 0 || options.only.some((part) => name.includes(part)))

async function timeAll(options: BenchOptions, args: readonly string[]): Promise<void> {
  const rows: RowResult[] = []
  for (const row of ROWS.filter((candidate) => isWanted(candidate, options))) {
    const messages = await messagesOf(row, args)
    const result = resultOf(
      { ...row, timeLimitSeconds: limitOf(row, options) },
      runsOf(messages, 'engine'),
      options.baseline ? runsOf(messages, 'baseline') : null,
    )
    rows.push(result)
    if (!options.json) console.log(lineOf(result))
  }
  finish({ ...circumstances(options), rows } as object, tableOf(rows), options)
}

async function weighAll(options: BenchOptions, args: readonly string[]): Promise<void> {
  const rows: { name: string; growth: number; peak: number; limit: number; found: boolean; seconds: number }[] = []
  for (const { row, limitMebibytes } of MEMORY_ROWS.filter(({ row }) => isWanted(row, { ...options, quick: false }))) {
    const messages = await messagesOf(row, args)
    const [run] = runsOf(messages, 'engine')
    for (const message of messages) {
      if (!('growth' in message)) continue
      const { growth, peak } = message
      rows.push({ name: row.name, growth, peak, limit: limitMebibytes, found: run!.found, seconds: run!.seconds })
    }
  }
  const lines = rows.map(
    ({ name, growth, peak, limit, found, seconds }) =>
      `| ${name} | ${growth.toFixed(0)} | ${growth <= limit ? '✓' : '✕'} ≤ ${limit} | ${peak.toFixed(0)} | ${found ? 'found' : 'none found'} | ${seconds.toFixed(1)} |`,
  )
  const head = '| instance | growth MiB | bar | peak MiB | result | s |\n| --- | --- | --- | --- | --- | --- |'
  finish({ ...circumstances(options), rows } as object, [head, ...lines].join('\n'), options)
}

function asChild(name: string, options: BenchOptions): void {
  const row = options.memory
    ? MEMORY_ROWS.find((candidate) => candidate.row.name === name)?.row
    : ROWS.find((candidate) => candidate.name === name)
  if (!row) throw new RangeError(`there is no row ${name}`)
  if (options.memory) measureMemory(row, options)
  else measureTimes(row, options)
}

async function main(args: readonly string[]): Promise<void> {
  let options: BenchOptions
  try {
    options = readOptions(args)
  } catch (error) {
    console.error(`${error instanceof Error ? error.message : String(error)}\n\n${USAGE}`)
    process.exitCode = 2
    return
  }
  if (options.child !== null) asChild(options.child, options)
  else if (options.memory) await weighAll(options, args)
  else await timeAll(options, args)
}

await main(process.argv.slice(2))
