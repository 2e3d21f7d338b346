import { chainCount, chainOf } from '../../shared/engine/embedding/embedding'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import type { Method } from '../../shared/engine/embedding/method'
import { findEmbedding } from '../../shared/engine/embedding/search'
import { createRandom } from '../../shared/engine/random'
import { baselineEmbedding } from './baseline'
import { faultOf } from './check'
import type { Row } from './rows'

/** One run on one seed. Seconds are processor time of the whole process, all threads together. */
export interface Run {
  readonly seed: number
  readonly found: boolean
  readonly firstSeconds: number | null
  readonly seconds: number
  /** Qubits of the first valid embedding; null for the engine, which does not tell. */
  readonly firstQubits: number | null
  readonly qubits: number | null
  readonly longest: number | null
  readonly mean: number | null
  /** The method that gave the embedding; null for the baseline. */
  readonly method: Method | null
  /** Set when the run threw or gave an invalid embedding; it counts as not found. */
  readonly fault: string | null
}

export interface EngineOptions {
  readonly method: Method | 'auto'
  readonly tries: number
}

/** Processor time of this process so far, in seconds: the machine may be shared, and the wall clock then tells little. */
export function processorSeconds(): number {
  const { user, system } = process.cpuUsage()
  return (user + system) / 1e6
}

const listsOf = (embedding: Embedding): Uint32Array[] =>
  Array.from({ length: chainCount(embedding) }, (_, i) => chainOf(embedding, i))

function runOf(
  seed: number,
  chains: readonly ArrayLike<number>[] | null,
  times: Pick<Run, 'firstSeconds' | 'firstQubits' | 'seconds' | 'method'>,
  fault: string | null,
): Run {
  const valid = chains !== null && fault === null
  const lengths = valid ? chains.map(({ length }) => length) : []
  const qubits = lengths.reduce((sum, length) => sum + length, 0)
  return {
    seed,
    found: valid,
    ...times,
    qubits: valid ? qubits : null,
    longest: valid ? lengths.reduce((most, length) => Math.max(most, length), 0) : null,
    mean: valid ? qubits / lengths.length : null,
    fault,
  }
}

/** Runs the engine on the row's instance of this seed. */
export function runEngine(
  { make, objective }: Row,
  seed: number,
  timeLimitSeconds: number,
  options: EngineOptions,
): Run {
  const task = make(seed)
  const control = { now: processorSeconds, cancelled: () => false, report: () => {} }
  const began = processorSeconds()
  try {
    const result = findEmbedding(task, { ...options, seed, objective, timeLimitSeconds }, control)
    const { seconds, firstSeconds, method } = result
    const chains = result.embedding && listsOf(result.embedding)
    const fault = chains && faultOf(task.problem, task.machine, task.usable, chains)
    return runOf(seed, chains, { seconds, firstSeconds, firstQubits: null, method }, fault)
  } catch (error) {
    const times = { seconds: processorSeconds() - began, firstSeconds: null, firstQubits: null, method: null }
    return runOf(seed, null, times, error instanceof Error ? error.message : String(error))
  }
}

/** Runs the baseline on the same instance. */
export function runBaseline({ make }: Row, seed: number, timeLimitSeconds: number): Run {
  const { problem, machine, usable } = make(seed)
  const limits = { timeLimitSeconds, now: processorSeconds }
  const { chains, seconds, firstSeconds, firstQubits } = baselineEmbedding(
    problem,
    machine,
    usable,
    createRandom(seed),
    limits,
  )
  const fault = chains && faultOf(problem, machine, usable, chains)
  return runOf(seed, chains, { seconds, firstSeconds, firstQubits, method: null }, fault)
}
