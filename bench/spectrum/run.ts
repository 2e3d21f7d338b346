/**
 * How long the lowest levels of a few spins along an anneal take, in processor time of one thread, as the page works them
 * out: `npm run bench:spectrum -- --help`.
 */
import { execFileSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus } from 'node:os'
import type { EnergyTable } from '../../shared/engine/machine/energy-table'
import { createRandom } from '../../shared/engine/random'
import { spectrumOf } from '../../shared/engine/spectrum/spectrum'
import type { SpinModel } from '../../shared/engine/spectrum/spin-operator'
import { readOptions, USAGE } from './options'

/** Seconds of processor time that 12 spins at 101 points may take. */
const BAR = 20
const LEVELS = 6
/** Invented, of the shape that machine tables have: A falls fast, B rises. */
const TABLE: EnergyTable = (() => {
  const s = Array.from({ length: 51 }, (_, k) => k / 50)
  return { s, A: s.map((at) => 9 * (1 - at) ** 3), B: s.map((at) => 0.3 + 11 * at ** 1.6) }
})()

interface Row {
  readonly model: string
  readonly spins: number
  readonly points: number
  /** Seconds of processor time: least, median and most over the rounds. */
  readonly least: number
  readonly median: number
  readonly most: number
  /** GHz. */
  readonly residual: number
}

/** Every pair coupled, with fields or without: the densest a problem of so many variables can be. */
function complete(n: number, field: number): SpinModel {
  const random = createRandom(n)
  const ends: number[] = []
  for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) ends.push(i, j)
  return {
    h: Float64Array.from({ length: n }, () => field * (2 * random.float() - 1)),
    ends: Uint32Array.from(ends),
    J: Float64Array.from({ length: ends.length / 2 }, () => (2 * random.float() - 1) / 2),
  }
}

/** Two chains held by strong couplings, a few couplings between: what a cluster of chains looks like. */
function twoChains(n: number): SpinModel {
  const random = createRandom(n + 1)
  const half = n >> 1
  const ends: number[] = []
  const J: number[] = []
  for (let i = 0; i + 1 < n; i++) {
    if (i + 1 === half) continue
    ends.push(i, i + 1)
    J.push(-1)
  }
  for (let i = 0; i < half; i += 2) {
    ends.push(i, half + i)
    J.push((2 * random.float() - 1) / 2)
  }
  const h = Float64Array.from({ length: n }, () => (2 * random.float() - 1) / 4)
  return { h, ends: Uint32Array.from(ends), J: Float64Array.from(J) }
}

function seconds(work: () => void): number {
  const before = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(before)
  return (user + system) / 1e6
}

const quiet = { cancelled: () => false, report: () => undefined }

function measure(model: string, spins: SpinModel, points: number, rounds: number): Row {
  const times: number[] = []
  let residual = 0
  for (let round = 0; round < rounds; round++)
    times.push(
      seconds(() => {
        residual = spectrumOf(spins, TABLE, { levels: LEVELS, points, seed: round + 1 }, quiet)!.residual
      }),
    )
  times.sort((a, b) => a - b)
  const [least, median, most] = [times[0]!, times[times.length >> 1]!, times.at(-1)!]
  return { model, spins: spins.h.length, points, least, median, most, residual }
}

function main(args: readonly string[]): void {
  if (args.includes('--help')) return void process.stdout.write(`${USAGE}\n`)
  const { rounds, spins, points, json, keep } = readOptions(args)
  const rows = [
    measure('complete graph with fields', complete(spins, 0.5), points, rounds),
    measure('complete graph without fields', complete(spins, 0), points, rounds),
    measure('two chains with fields', twoChains(spins), points, rounds),
  ]
  const commit = execFileSync('git', ['rev-parse', '--short', 'HEAD'], { encoding: 'utf8' }).trim()
  const report = { bench: 'spectrum', commit, node: process.version, cpu: cpus()[0]?.model, rounds, bar: BAR, rows }
  const text = `${JSON.stringify(report, null, 2)}\n`
  if (json) process.stdout.write(text)
  else
    for (const { model, least, median, most, residual } of rows)
      process.stdout.write(
        `${model.padEnd(32)} ${spins} spins × ${points} points: ${least.toFixed(2)} / ${median.toFixed(2)} / ${most.toFixed(2)} s (least / median / most of ${rounds}), residual ${residual.toExponential(1)} GHz${spins === 12 && points === 101 ? `, under ${BAR} s: ${most < BAR ? 'yes' : 'no'}` : ''}\n`,
      )
  if (!keep) return
  const date = new Date().toISOString().slice(0, 10)
  mkdirSync('bench/results', { recursive: true })
  writeFileSync(`bench/results/${date}-${commit}-spectrum.json`, text)
}

main(process.argv.slice(2))
