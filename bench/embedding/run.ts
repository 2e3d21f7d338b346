/**
 * Measures the embedding search over seeds, one try each:
 *
 *     npx tsx bench/embedding/run.ts [seeds=5] [part of an instance's name]
 *
 * Prints a table, then the same as JSON on one line.
 */
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import { embeddingStats } from '../../shared/engine/embedding/stats'
import { findEmbedding } from '../../shared/engine/embedding/search'
import { taskOf } from '../../tests/fixtures/graphs'
import { INSTANCES } from './instances'
import type { Instance } from './instances'

const TIME_LIMIT_SECONDS = 30

interface Row {
  readonly instance: string
  readonly found: string
  readonly minSeconds: number
  readonly medianSeconds: number
  readonly maxSeconds: number
  readonly medianQubits: number | null
  readonly medianLongestChain: number | null
}

const round = (value: number): number => Math.round(value * 1000) / 1000

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null
  const sorted = [...values].sort((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1]! + sorted[sorted.length >> 1]!) / 2
}

function measure({ name, make }: Instance, seeds: number): Row {
  const seconds: number[] = []
  const qubits: number[] = []
  const longest: number[] = []
  for (let seed = 1; seed <= seeds; seed++) {
    const { problem, machine, usable } = make(seed)
    const control = { now: () => performance.now() / 1000, cancelled: () => false, report: () => {} }
    const options = { seed, tries: 1, timeLimitSeconds: TIME_LIMIT_SECONDS }
    const result = findEmbedding(taskOf(problem, machine, usable), options, control)
    seconds.push(result.seconds)
    if (!result.embedding) continue
    const [violation] = verifyEmbedding(problem, machine, usable, result.embedding)
    if (violation) throw new Error(`${name}, seed ${seed}: ${violation.message}`)
    const stats = embeddingStats(result.embedding, problem, machine)
    qubits.push(stats.qubitsUsed)
    longest.push(stats.chainLength.max)
  }
  return {
    instance: name,
    found: `${qubits.length}/${seeds}`,
    minSeconds: round(Math.min(...seconds)),
    medianSeconds: round(median(seconds) ?? 0),
    maxSeconds: round(Math.max(...seconds)),
    medianQubits: median(qubits),
    medianLongestChain: median(longest),
  }
}

const seeds = Number(process.argv[2] ?? 5)
const wanted = process.argv[3] ?? ''
const rows = INSTANCES.filter(({ name }) => name.includes(wanted)).map((instance) => measure(instance, seeds))
console.table(rows)
console.log(JSON.stringify({ bench: 'embedding', seeds, timeLimitSeconds: TIME_LIMIT_SECONDS, rows }))
