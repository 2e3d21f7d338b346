/** Speed of the ways to a reference optimum, in processor time of one thread: `npm run bench:optimum -- --help`. */
import { execFileSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus } from 'node:os'
import { readOptions, USAGE } from './options'
import type { OptimumRow } from './rows'
import { ROWS } from './rows'

interface Measured {
  readonly name: string
  readonly unit: string
  readonly outcome: string
  /** Processor seconds: least, median and most over the rounds. */
  readonly seconds: { readonly least: number; readonly median: number; readonly most: number }
  /** Units of work a second, in the round of the median. */
  readonly rate: number
}

async function measure({ name, unit, run }: OptimumRow, rounds: number): Promise<Measured> {
  const seconds: number[] = []
  let last = { work: 0, outcome: '' }
  for (let round = 0; round < rounds; round++) {
    const before = process.cpuUsage()
    last = await run()
    const { user, system } = process.cpuUsage(before)
    seconds.push((user + system) / 1e6)
  }
  seconds.sort((a, b) => a - b)
  const median = seconds[seconds.length >> 1]!
  const { work, outcome } = last
  return { name, unit, outcome, seconds: { least: seconds[0]!, median, most: seconds.at(-1)! }, rate: work / median }
}

const rowText = ({ name, unit, outcome, seconds, rate }: Measured): string =>
  [
    name.padEnd(48),
    `${seconds.least.toFixed(2)} / ${seconds.median.toFixed(2)} / ${seconds.most.toFixed(2)} s`.padEnd(26),
    `${rate.toPrecision(3)} ${unit}/s`.padEnd(26),
    outcome,
  ].join(' ')

const args = process.argv.slice(2)
if (args.includes('--help')) {
  console.log(USAGE)
  process.exit(0)
}
const { only, rounds, json, keep } = readOptions(args)
const measured: Measured[] = []
for (const row of ROWS) {
  if (only.length > 0 && !only.some((name) => row.name.includes(name))) continue
  measured.push(await measure(row, rounds))
  if (!json) console.log(rowText(measured.at(-1)!))
}
const commit = execFileSync('git', ['rev-parse', '--short', 'HEAD'], { encoding: 'utf8' }).trim()
const report = { commit, date: new Date().toISOString(), processor: cpus()[0]?.model, rounds, rows: measured }
if (json) console.log(JSON.stringify(report, null, 2))
if (keep) {
  mkdirSync('bench/results', { recursive: true })
  const path = `bench/results/${report.date.slice(0, 10)}-${commit}-optimum.json`
  writeFileSync(path, `${JSON.stringify(report, null, 2)}\n`)
  if (!json) console.log(`kept in ${path}`)
}
process.exit(0)
