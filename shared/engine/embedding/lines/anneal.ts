import type { Watch } from '../progress'
import type { Assignment } from './assignment'
import { MISSING_WEIGHT } from './assignment'
import type { Coin } from './coin'
import { Mover } from './moves'

/** What an anneal changes from its beginning to its end. */
export interface Schedule {
  /** Number of moves. */
  readonly moves: number
  /** Share of the moves over which the figures below go from their first value to their last. */
  readonly ramp: number
  /** Temperature, geometric. */
  readonly hottest: number
  readonly coldest: number
  /** Energy of one pair of intervals on a qubit, linear. */
  readonly firstPairWeight: number
  readonly lastPairWeight: number
  /** Energy of a qubit. */
  readonly lengthWeight: number
  /** Largest distance of a line from where it was, in lines, linear. */
  readonly firstRadius: number
  readonly lastRadius: number
  /** Whether to end in the first state that is an embedding. */
  readonly endsWhenValid: boolean
}

/** Moves between two looks at the watch: a few milliseconds. */
const MOVES_PER_LOOK = 1024

/**
 * Simulated annealing (Kirkpatrick, Gelatt & Vecchi, Science 220, 1983) of line intervals, for problems that have
 * interactions. Returns false when it was stopped.
 * @param share of the try's work that is done when it begins, and when it ends; 0 … 1
 */
export function anneal(
  assignment: Assignment,
  coin: Coin,
  schedule: Schedule,
  watch: Watch,
  share: readonly [number, number],
): boolean {
  const { moves, ramp, hottest, coldest, firstPairWeight, lastPairWeight, lengthWeight } = schedule
  const { firstRadius, lastRadius, endsWhenValid } = schedule
  const mover = new Mover(assignment, coin)
  for (let done = 0; done < moves; done += MOVES_PER_LOOK) {
    if (watch.shouldStop(assignment.pairs)) return false
    const way = Math.min(1, done / (moves * ramp))
    const temperature = hottest * (coldest / hottest) ** way
    const pairWeight = firstPairWeight + (lastPairWeight - firstPairWeight) * way
    const radius = Math.round(firstRadius + (lastRadius - firstRadius) * way)
    assignment.setWeights(lengthWeight, pairWeight)
    for (let i = Math.min(MOVES_PER_LOOK, moves - done); i > 0; i--) {
      const { length, pairs, missing } = assignment
      assignment.begin()
      mover.make(radius)
      const rise =
        lengthWeight * (assignment.length - length) +
        pairWeight * (assignment.pairs - pairs) +
        MISSING_WEIGHT * (assignment.missing - missing)
      if (rise > 0 && Math.exp(-rise / temperature) < coin.float()) assignment.undo()
      else if (endsWhenValid && assignment.pairs === 0 && assignment.missing === 0) return true
    }
    watch.report(assignment.pairs, share[0] + ((share[1] - share[0]) * done) / moves)
  }
  return true
}
