/**
 * Speed of the samplers of a rehearsal in processor time of one thread, and whether the fast ones draw from the same
 * distribution of energies as the plain loop: `npm run bench:sampling -- --help`.
 */
import { execFileSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus } from 'node:os'
import { annealIn } from '../../shared/engine/sampling/anneal-in'
import { annealSchedule } from '../../shared/engine/sampling/annealing-schedule'
import { roundingIn, roundingsOf } from '../../shared/engine/sampling/arithmetic'
import type { Arithmetic } from '../../shared/engine/sampling/arithmetic'
import type { CouplingList } from '../../shared/engine/sampling/physical-model'
import { samplerModel } from '../../shared/engine/sampling/physical-model'
import { kolmogorovSmirnov } from '../../tests/support/two-sample'
import { energiesOfRows } from '../../tests/unit/engine/sampling/lattices'
import { pegasusInstance } from './instance'
import { readOptions, USAGE } from './options'
import type { Sampler } from './samplers'
import { laneSampler, pathIntegral, plainLoop, textbookLoop } from './samplers'

const QUBITS = 2000
const TEMPERATURES = [4, 1, 0.4]
/** Sweeps to equilibrium from a random start at each of them; what matters is that they are the same for both. */
const SWEEPS_OF_TEST = 300
const BARS = { '16-bit': { hard: 15, moonshot: 36 }, '32-bit': { hard: 4, moonshot: 8 } } as const
const kinds = ['16-bit', '32-bit'] as const

interface Speed {
  readonly schedule: string
  readonly sampler: string
  /** Million spin updates a second of processor time: least, median and most over the rounds. */
  readonly least: number
  readonly median: number
  readonly most: number
  /** Median of the ratios to the plain loop, round by round, each measured just before. */
  readonly ratio: number
}

function seconds(work: () => void): number {
  const before = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(before)
  return (user + system) / 1e6
}

const medianOf = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]!

/** Samplers take turns, so that what else the machine does falls on all of them alike. */
function speeds(label: string, schedule: Float64Array, samplers: readonly Sampler[], rounds: number): Speed[] {
  const rates = samplers.map(() => [] as number[])
  for (const { run } of samplers) run(schedule, 0)
  for (let round = 1; round <= rounds; round++)
    samplers.forEach(({ lanes, run }, k) => {
      const runs = Math.max(1, Math.round(16 / lanes / 4))
      const spent = seconds(() => {
        for (let r = 0; r < runs; r++) run(schedule, round * 100 + r)
      })
      rates[k]!.push((runs * lanes * QUBITS * schedule.length) / spent / 1e6)
    })
  return samplers.map(({ name }, k) => ({
    schedule: label,
    sampler: name,
    least: Math.min(...rates[k]!),
    median: medianOf(rates[k]!),
    most: Math.max(...rates[k]!),
    ratio: medianOf(rates[k]!.map((rate, round) => rate / rates[0]![round]!)),
  }))
}

interface Comparison {
  readonly temperature: number
  readonly arithmetic: Arithmetic
  readonly mean: number
  readonly deviation: number
  readonly distance: number
  readonly p: number
}

function comparisons(list: CouplingList, reads: number): Comparison[] {
  return TEMPERATURES.flatMap((temperature) => {
    const energies = (arithmetic: Arithmetic, seed: number): Float64Array => {
      const options = { reads, sweeps: SWEEPS_OF_TEST, seed, startTemperature: temperature, temperature, arithmetic }
      const control = { cancelled: () => false, report: () => undefined }
      return energiesOfRows(list, annealIn(samplerModel(list), options, control))
    }
    const plain = energies('64-bit', 1)
    return (['64-bit', ...kinds] as const).map((arithmetic) => {
      const drawn = arithmetic === '64-bit' ? plain : energies(arithmetic, 2)
      const mean = drawn.reduce((a, b) => a + b) / reads
      const deviation = Math.sqrt(drawn.reduce((sum, e) => sum + (e - mean) ** 2, 0) / (reads - 1))
      return { temperature, arithmetic, mean, deviation, ...kolmogorovSmirnov(plain, drawn) }
    })
  })
}

const args = process.argv.slice(2)
if (args.includes('--help')) {
  console.log(USAGE)
  process.exit(0)
}
const { rounds, sweeps, reads, json, keep } = readOptions(args)
const say = (line: string): void => void (json || console.log(line))
const list = pegasusInstance(QUBITS, 1)
const model = samplerModel(list)
const roundings = roundingsOf(model)
say(`${QUBITS} qubits of P(16), ${list.J.length} couplings, largest local field ${roundings.largestField.toFixed(3)}`)
for (const kind of kinds) say(`${kind}: no value off by more than ${roundingIn(roundings, kind).toPrecision(3)}`)

const samplers = [plainLoop(model), textbookLoop(model), ...kinds.map((kind) => laneSampler(model, kind))]
const schedules: readonly (readonly [string, Float64Array])[] = [
  ['anneal to 0.1', annealSchedule(model, { sweeps, seed: 1 })],
  ...TEMPERATURES.map((T) => [`T = ${T}`, new Float64Array(sweeps).fill(1 / T)] as const),
]
const measured: Speed[] = []
for (const [label, schedule] of schedules) {
  measured.push(...speeds(label, schedule, samplers, rounds))
  for (const { sampler, least, median, most, ratio } of measured.slice(-samplers.length))
    say(
      `${label.padEnd(14)} ${sampler.padEnd(14)} ${[least, median, most].map((rate) => rate.toFixed(0).padStart(5)).join(' / ')} M updates/s  ${ratio.toFixed(1)} ×`,
    )
}
const path = speeds('anneal', new Float64Array(8), [pathIntegral(model, 32)], Math.min(rounds, 3))
say(`anneal         ${path[0]!.sampler}: ${path[0]!.median.toFixed(1)} M updates of a slice a second`)

const bars = kinds.map((kind) => {
  const { ratio } = measured.find(({ sampler }) => sampler === kind)!
  const { hard, moonshot } = BARS[kind]
  say(
    `${kind}: ${ratio.toFixed(1)} × the plain loop over an anneal; bar ${hard} ${ratio >= hard ? 'met' : 'MISSED'}, ${moonshot} ${ratio >= moonshot ? 'met' : 'missed'}`,
  )
  return { kind, ratio, hard, moonshot }
})
say(`energies of ${reads} reads of ${SWEEPS_OF_TEST} sweeps at constant temperature, against the plain loop’s:`)
const compared = comparisons(list, reads)
for (const { temperature, arithmetic, mean, deviation, distance, p } of compared)
  say(
    `T = ${String(temperature).padEnd(4)} ${arithmetic} mean ${mean.toFixed(2)} ± ${(deviation / Math.sqrt(reads)).toFixed(2)}, deviation ${deviation.toFixed(2)}${arithmetic === '64-bit' ? '' : `, Kolmogorov–Smirnov ${distance.toFixed(3)}, p = ${p.toPrecision(2)}`}`,
  )
const commit = execFileSync('git', ['rev-parse', '--short', 'HEAD'], { encoding: 'utf8' }).trim()
const report = {
  commit,
  date: new Date().toISOString(),
  processor: cpus()[0]?.model,
  rounds,
  sweeps,
  reads,
  couplings: list.J.length,
  roundings,
  speeds: [...measured, ...path],
  bars,
  comparisons: compared,
}
if (json) console.log(JSON.stringify(report, null, 2))
if (keep) {
  mkdirSync('bench/results', { recursive: true })
  const file = `bench/results/${report.date.slice(0, 10)}-${commit}-sampling.json`
  writeFileSync(file, `${JSON.stringify(report, null, 2)}\n`)
  say(`kept in ${file}`)
}
