import type { PartialEmbedding, Runner } from '../method'
import { sizeOf } from '../../graph/graph'
import type { Watch } from '../progress'
import { shortenEmbedding } from '../rework'
import type { EmbeddingTask } from '../task'
import { anneal } from './anneal'
import type { Schedule } from './anneal'
import { Assignment } from './assignment'
import { Coin } from './coin'
import { crossingsOf } from './crossings'
import { isWhole, lacks, mendOnce } from './repair'
import type { Mended } from './repair'
import { seat } from './seat'

const DEFAULTS = {
  /** Moves for each variable: of a first, quick anneal, of a patient one where that does not do, and of that for quality. */
  quickMoves: 2500,
  patientMoves: 5500,
  qualityMoves: 7000,
  /** Largest distance of a line from where it was placed, as a share of all lines. */
  firstReach: 0.25,
  /** Largest share of the working qubits in intervals at which a machine is roomy. */
  roomyShare: 0.65,
  /** Largest overuse that mending is tried at, and how often when one thing is lacking; the less often the more are. */
  mendablePairs: 60,
  mendings: 400,
}

/** From the placement to intervals that hardly overlap: length counts little, overuse more and more. */
const quickSchedule = (moves: number, lines: number): Schedule => ({
  moves,
  ramp: 1,
  hottest: 0.6,
  coldest: 0.2,
  firstPairWeight: 0.25,
  lastPairWeight: 1.5,
  lengthWeight: 0.1,
  firstRadius: lines * DEFAULTS.firstReach,
  lastRadius: 3,
  endsWhenValid: true,
})

/** The same more slowly, beginning so late in it that what the quick anneal has put in order stays so. */
const patientSchedule = (moves: number, lines: number): Schedule => ({
  ...quickSchedule(moves, lines),
  hottest: 0.57,
  firstPairWeight: 0.55,
})

/**
 * From there to shorter intervals that do not overlap. Where there is room the anneal may begin by letting them overlap
 * more, and so rearrange them all; in a full machine they would not come apart again.
 */
const qualitySchedule = (moves: number, lines: number, isRoomy: boolean): Schedule => ({
  moves,
  ramp: 1,
  hottest: isRoomy ? 1.5 : 1,
  coldest: 0.12,
  firstPairWeight: isRoomy ? 0.6 : 1.5,
  lastPairWeight: 6,
  lengthWeight: 0.5,
  firstRadius: lines,
  lastRadius: 5,
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
  for (let i = 1; i * lacks(best) < DEFAULTS.mendings && !isWhole(best) && !watch.shouldStop(lacks(best)); i++) {
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
  const lines = Math.max(...crossings.counts)
  const annealAndMend = (schedule: Schedule, from: number, to: number): Mended => {
    watch.phase = 'assigning lines'
    anneal(assignment, coin, schedule, watch, [from, to])
    const mended = mend(assignment, task, coin, watch)
    if (isWhole(mended)) offer(mended.chains.toEmbedding())
    return mended
  }
  watch.phase = 'placing'
  seat(assignment, random, coin, () => watch.shouldStop(assignment.pairs))
  let valid = annealAndMend(quickSchedule(DEFAULTS.quickMoves * problem.order, lines), 0, 0.2)
  if (!isWhole(valid)) valid = annealAndMend(patientSchedule(DEFAULTS.patientMoves * problem.order, lines), 0.2, 0.5)
  if (!isWhole(valid)) return partialOf(valid)
  const isRoomy = assignment.length <= DEFAULTS.roomyShare * usable.reduce((sum, works) => sum + works, 0)
  const better = annealAndMend(qualitySchedule(DEFAULTS.qualityMoves * problem.order, lines, isRoomy), 0.5, 0.8)
  const { chains } = isWhole(better) ? better : valid
  shortenEmbedding(task, chains.toEmbedding(), new Uint8Array(problem.order), attempt)
  return null
}
