import type { Attempt, PartialEmbedding, Runner } from '../method'
import { sizeOf } from '../../graph/graph'
import { shortenEmbedding } from '../rework'
import type { EmbeddingTask } from '../task'
import { anneal, scatter } from './anneal'
import type { Schedule } from './anneal'
import { Assignment } from './assignment'
import { Coin } from './coin'
import { crossingsOf } from './crossings'
import { isWhole, lacks, mendOnce } from './repair'
import type { Mended } from './repair'

const DEFAULTS = {
  /** Moves of the first anneal and of the quality phase, by interaction and variable. */
  movesPerEnd: 2000,
  /** Largest overuse that mending is tried at, and how often. */
  mendablePairs: 60,
  mendings: 400,
}

function firstSchedule(moves: number, lines: number): Schedule {
  return {
    moves,
    ramp: 0.85,
    hottest: 0.8,
    coldest: 0.2,
    firstPairWeight: 0.5,
    lastPairWeight: 2,
    lengthWeight: 0.1,
    firstRadius: lines,
    lastRadius: 3,
  }
}

function qualitySchedule(moves: number): Schedule {
  return {
    moves,
    ramp: 1,
    hottest: 0.8,
    coldest: 0.12,
    firstPairWeight: 2,
    lastPairWeight: 6,
    lengthWeight: 0.3,
    firstRadius: 20,
    lastRadius: 20,
  }
}

function partialOf({ chains, unmet, unplaced }: Mended): PartialEmbedding {
  return { chains: chains.toEmbedding(), overlap: 0, overlappedQubits: [], unmet, unplaced }
}

/** Mends the intervals again and again until nothing is lacking; returns the best. */
function mend(assignment: Assignment, task: EmbeddingTask, coin: Coin, { watch }: Attempt): Mended {
  watch.phase = 'repairing'
  let best = mendOnce(assignment, task.machine, task.usable, coin)
  if (assignment.pairs > DEFAULTS.mendablePairs) return best
  for (let i = 1; i < DEFAULTS.mendings && !isWhole(best) && !watch.shouldStop(best.unmet.length); i++) {
    const mended = mendOnce(assignment, task.machine, task.usable, coin)
    if (lacks(mended) < lacks(best)) best = mended
  }
  return best
}

/**
 * One try of giving each variable a vertical and a horizontal line of a machine whose qubits are straight segments, for
 * problems that are dense but far from complete: anneal the lines until intervals no longer overlap, mend what is left,
 * anneal on for fewer qubits, and shorten the chains. Returns null at once where the machine has no crossing lines.
 */
export const assignLines: Runner = (task, attempt) => {
  const { problem, machine, usable } = task
  const { random, watch, offer } = attempt
  const crossings = crossingsOf(machine, usable, task.segments)
  if (!crossings || problem.order === 0) return null
  const coin = new Coin(random)
  const assignment = new Assignment(problem, crossings)
  const moves = DEFAULTS.movesPerEnd * (problem.order + sizeOf(problem))
  const lines = Math.max(...crossings.counts)
  let best = null as Mended | null
  const take = (mended: Mended): void => {
    if (isWhole(mended)) offer(mended.chains.toEmbedding())
    if (!best || lacks(mended) <= lacks(best)) best = mended
  }
  watch.phase = 'assigning lines'
  scatter(assignment, coin)
  const first = (): void => take(mendOnce(assignment, machine, usable, coin))
  const finished = anneal(assignment, coin, firstSchedule(moves, lines), watch, [0, 0.5], first)
  if (!best || finished) take(mend(assignment, task, coin, attempt))
  if (!best || !isWhole(best)) return best && partialOf(best)
  watch.phase = 'assigning lines'
  if (anneal(assignment, coin, qualitySchedule(moves), watch, [0.5, 0.8], null))
    take(mend(assignment, task, coin, attempt))
  shortenEmbedding(task, best.chains.toEmbedding(), new Uint8Array(problem.order), attempt)
  return null
}
