import type { PartialEmbedding, Runner } from '../method'
import { sizeOf } from '../../graph/graph'
import type { Watch } from '../progress'
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
  /** Moves a variable of the first anneal and of the one for quality. */
  firstMoves: 6000,
  qualityMoves: 6000,
  /** Largest overuse that mending is tried at, and how often. */
  mendablePairs: 60,
  mendings: 400,
}

/** From anywhere to intervals that hardly overlap: length counts little, overuse more and more. */
const firstSchedule = (moves: number, lines: number): Schedule => ({
  moves,
  ramp: 0.85,
  hottest: 0.8,
  coldest: 0.2,
  firstPairWeight: 0.5,
  lastPairWeight: 2,
  lengthWeight: 0.1,
  firstRadius: lines,
  lastRadius: 3,
  endsWhenValid: true,
})

/** From there to shorter intervals that do not overlap. */
const qualitySchedule = (moves: number): Schedule => ({
  moves,
  ramp: 1,
  hottest: 0.8,
  coldest: 0.12,
  firstPairWeight: 2,
  lastPairWeight: 6,
  lengthWeight: 0.3,
  firstRadius: 20,
  lastRadius: 20,
  endsWhenValid: false,
})

function partialOf({ chains, unmet, unplaced }: Mended): PartialEmbedding {
  return { chains: chains.toEmbedding(), overlap: 0, overlappedQubits: [], unmet, unplaced }
}

/** Mends the intervals again and again until nothing is lacking; returns the best. */
function mend(assignment: Assignment, task: EmbeddingTask, coin: Coin, watch: Watch): Mended {
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
  if (!crossings || sizeOf(problem) === 0) return null
  const coin = new Coin(random)
  const assignment = new Assignment(problem, crossings)
  const mendAndOffer = (): Mended => {
    const mended = mend(assignment, task, coin, watch)
    if (isWhole(mended)) offer(mended.chains.toEmbedding())
    return mended
  }
  watch.phase = 'assigning lines'
  scatter(assignment, coin)
  const first = firstSchedule(DEFAULTS.firstMoves * problem.order, Math.max(...crossings.counts))
  anneal(assignment, coin, first, watch, [0, 0.4])
  const valid = mendAndOffer()
  if (!isWhole(valid)) return partialOf(valid)
  watch.phase = 'assigning lines'
  const quality = qualitySchedule(DEFAULTS.qualityMoves * problem.order)
  anneal(assignment, coin, quality, watch, [0.4, 0.8])
  const better = mendAndOffer()
  const { chains } = isWhole(better) ? better : valid
  shortenEmbedding(task, chains.toEmbedding(), new Uint8Array(problem.order), attempt)
  return null
}
