import type { Control } from '../control'
import type { Embedding } from './embedding'
import { provedInfeasible } from './feasibility'
import { lacks } from './method'
import type { Method, PartialEmbedding } from './method'
import type { Objective, Target } from './objective'
import { compareQuality } from './objective'
import { planTries } from './plan'
import type { SearchProgress, StopReason } from './progress'
import type { EmbeddingTask } from './task'
import { runTry } from './tries'
import type { TryResult, TrySettings } from './tries'

export interface SearchOptions extends TrySettings {
  /** `auto` races the methods that fit the problem and the machine. */
  readonly method: Method | 'auto'
  /** Independent tries, at least 1, of each method where `auto` races several; the best embedding of all is kept. */
  readonly tries: number
  readonly objective: Objective
  readonly target: Target
}

export const DEFAULTS: SearchOptions = {
  method: 'auto',
  seed: 1,
  tries: 4,
  timeLimitSeconds: 30,
  objective: 'longest chain',
  target: { longestChain: null, totalQubits: null },
}

export interface SearchResult {
  readonly status: 'found' | 'none found' | 'cancelled' | 'timed out'
  readonly embedding: Embedding | null
  /** Whether cancellation or the time limit ended the search before all tries were done. */
  readonly stoppedEarly: boolean
  /** The closest invalid state when there is no embedding, unless a proved bound forbids any. */
  readonly partial: PartialEmbedding | null
  /** Method and number of the try that gave the embedding or the partial state; null and 0 when there is neither. */
  readonly method: Method | null
  readonly tryNumber: number
  readonly tries: number
  readonly seconds: number
  /** Seconds to the first valid embedding of any try; null without one. */
  readonly firstSeconds: number | null
}

/** What keeps the tries of a plan from being done. */
type EarlyEnd = Exclude<StopReason, 'target reached'>

/** Throws for options out of range, and for arrays that do not belong together. */
export function checkSearch(
  { problem, machine, usable, segments, start }: EmbeddingTask,
  options: SearchOptions,
): void {
  if (usable.length !== machine.order)
    throw new RangeError(`usable has ${usable.length} entries for a machine of ${machine.order} qubits`)
  if (segments && segments.length !== 4 * machine.order)
    throw new RangeError(`segments has ${segments.length} entries for a machine of ${machine.order} qubits`)
  if (start && (start.frozen.length !== problem.order || start.chains.offsets.length !== problem.order + 1))
    throw new RangeError(`the start does not belong to a problem of ${problem.order} variables`)
  if (!Number.isSafeInteger(options.seed) || options.seed < 0)
    throw new RangeError(`seed must be a non-negative integer, not ${options.seed}`)
  if (!Number.isSafeInteger(options.tries) || options.tries < 1)
    throw new RangeError(`tries must be an integer of at least 1, not ${options.tries}`)
  if (!(options.timeLimitSeconds > 0))
    throw new RangeError(`timeLimitSeconds must be above 0, not ${options.timeLimitSeconds}`)
  if (!start && (options.method === 'repair' || options.method === 'shorten'))
    throw new RangeError(`${options.method} needs an embedding to begin from`)
}

function closer(a: TryResult, b: TryResult, objective: Objective): number {
  if (a.quality && b.quality) return compareQuality(a.quality, b.quality, objective)
  if (a.quality || b.quality) return a.quality ? -1 : 1
  return (a.partial ? lacks(a.partial) : Infinity) - (b.partial ? lacks(b.partial) : Infinity) || 0
}

/**
 * The outcome of a search from the results of its tries, in any order: the best embedding, else the closest state; of
 * equals the one of the lowest try. Tries after the first that reached the target do not count, so that the outcome is
 * the same whether they ran at the same time or never.
 * @param ended what kept further tries from beginning; null when nothing did
 */
export function outcomeOf(
  results: readonly TryResult[],
  planned: number,
  options: SearchOptions,
  seconds: number,
  ended: EarlyEnd | null = null,
): SearchResult {
  const inOrder = [...results].sort((a, b) => a.tryNumber - b.tryNumber)
  const reached = inOrder.findIndex(({ stopped }) => stopped === 'target reached')
  const counted = reached < 0 ? inOrder : inOrder.slice(0, reached + 1)
  let best: TryResult | null = null
  for (const result of counted) if (!best || closer(result, best, options.objective) < 0) best = result
  const stops = counted.map(({ stopped }) => stopped)
  const cut = (['cancelled', 'timed out'] as const).find((reason) => stops.includes(reason)) ?? ended
  const first = counted.reduce((least, { firstSeconds }) => Math.min(least, firstSeconds ?? Infinity), Infinity)
  const shows = best && (best.embedding || best.partial)
  return {
    status: best?.embedding ? 'found' : (cut ?? 'none found'),
    embedding: best?.embedding ?? null,
    stoppedEarly: cut !== null || (reached < 0 && results.length < planned),
    partial: best?.partial ?? null,
    method: shows ? best!.method : null,
    tryNumber: shows ? best!.tryNumber : 0,
    tries: planned,
    seconds,
    firstSeconds: first === Infinity ? null : first,
  }
}

/**
 * Looks for a minor embedding of the problem graph in the usable part of the machine graph: each variable gets a
 * connected chain of qubits, chains are disjoint, and each interaction has a coupler between its chains. A heuristic
 * (sources at the methods): that none is found proves nothing. Runs the planned tries one after the other; callers with
 * several threads run `planTries`, `runTry` and `outcomeOf` themselves and get the same.
 *
 * The same task, seed and tries give the same embedding; the time limit and cancellation can only cut the search short,
 * and keep the best embedding found until then.
 * @throws RangeError for options out of range or arrays of the wrong length
 */
export function findEmbedding(
  task: EmbeddingTask,
  options: Partial<SearchOptions>,
  control: Control<SearchProgress>,
): SearchResult {
  const settings = { ...DEFAULTS, ...options }
  checkSearch(task, settings)
  const began = control.now()
  const seconds = (): number => control.now() - began
  const results: TryResult[] = []
  let ended: EarlyEnd | null = null
  const feasible = !provedInfeasible(task)
  const plan = feasible ? planTries(task, settings) : []
  for (const planned of plan) {
    const left = settings.timeLimitSeconds - seconds()
    if (control.cancelled()) ended = 'cancelled'
    else if (left <= 0) ended = 'timed out'
    if (ended) break
    const before = seconds()
    const result = runTry(task, planned, { ...settings, timeLimitSeconds: left }, control)
    results.push({ ...result, firstSeconds: result.firstSeconds === null ? null : before + result.firstSeconds })
    if (result.stopped) break
  }
  return outcomeOf(results, plan.length, settings, seconds(), ended)
}
