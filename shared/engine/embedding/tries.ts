import type { Control } from '../control'
import { createRandom } from '../random'
import { searchChains } from './chain-search'
import type { KernelChoice } from '../assembly'
import type { Embedding } from './embedding'
import { assignLines } from './lines/assign-lines'
import type { Method, PartialEmbedding, Runner } from './method'
import type { Objective, Quality, Target } from './objective'
import { changedChains, compareQuality, qualityOf, reaches } from './objective'
import type { PlannedTry } from './plan'
import { Watch } from './progress'
import type { SearchProgress, StopReason } from './progress'
import { fitTemplate } from './templates/fit-template'
import { repairStart, shortenStart } from './rework'
import type { EmbeddingTask } from './task'
import { verifyEmbedding } from './verify'

export interface TrySettings {
  /** Any non-negative safe integer. */
  readonly seed: number
  readonly objective: Objective
  readonly target: Target
  /** Seconds on the given clock after which the try ends with the best so far. */
  readonly timeLimitSeconds: number
  /** `assembly` unless said otherwise; embeddings are the same, only the time differs. */
  readonly kernel?: KernelChoice
}

export interface TryResult extends PlannedTry {
  readonly embedding: Embedding | null
  readonly quality: Quality | null
  /** The closest invalid state when there is no embedding. */
  readonly partial: PartialEmbedding | null
  /** What ended the try before its own end. */
  readonly stopped: StopReason | null
  readonly seconds: number
  /** Seconds to the first valid embedding; null without one. */
  readonly firstSeconds: number | null
}

const RUNNERS: Record<Method, Runner> = {
  search: searchChains,
  lines: assignLines,
  template: fitTemplate,
  repair: repairStart,
  shorten: shortenStart,
}

/**
 * Runs one planned try. The same task, seed and try give the same embedding, wherever it runs; the time limit and
 * cancellation can only cut it short. Every embedding is checked before it counts.
 */
export function runTry(
  task: EmbeddingTask,
  { tryNumber, method, share }: PlannedTry,
  { seed, objective, target, timeLimitSeconds, kernel = 'assembly' }: TrySettings,
  control: Control<SearchProgress>,
): TryResult {
  const watch = new Watch(control, method, tryNumber, timeLimitSeconds)
  let embedding: Embedding | null = null
  let firstSeconds: number | null = null
  const offer = (candidate: Embedding): void => {
    const changed = method === 'repair' && task.start ? changedChains(task.start.chains, candidate) : 0
    const quality = { ...qualityOf(candidate), changed }
    if (watch.best && compareQuality(quality, watch.best, objective) >= 0) return
    const [violation] = verifyEmbedding(task.problem, task.machine, task.usable, candidate)
    if (violation) throw new Error(`${method} made an invalid embedding: ${violation.message}`)
    firstSeconds ??= watch.seconds()
    embedding = candidate
    watch.best = quality
    if (reaches(quality, target)) watch.stopped ??= 'target reached'
  }
  const random = createRandom(seed, tryNumber)
  const partial = RUNNERS[method](task, { random, objective, seconds: share, kernel, watch, offer })
  return {
    tryNumber,
    method,
    share,
    embedding,
    quality: watch.best,
    partial: embedding ? null : partial,
    stopped: watch.stopped,
    seconds: watch.seconds(),
    firstSeconds,
  }
}
