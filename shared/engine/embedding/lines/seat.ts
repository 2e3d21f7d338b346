import { degreeOf } from '../../graph/graph'
import type { Random } from '../../random'
import { estimatedQubits, placeProblem } from '../placement'
import type { Assignment } from './assignment'
import type { Coin } from './coin'

const DEFAULTS = {
  /** Factor on the work of placing. */
  effort: 1,
  /** Factor on the estimated need that decides how much of the machine is taken at first. */
  slack: 1.5,
}

/** Share of the machine's width and height that the problem is spread over. */
function spreadOf({ problem, crossings }: Assignment): number {
  const working = crossings.broken.reduce((sum, broken) => sum + 1 - broken, 0)
  let need = 0
  for (let v = 0; v < problem.order; v++) need += estimatedQubits(degreeOf(problem, v))
  return Math.sqrt(Math.min(1, (DEFAULTS.slack * need) / working))
}

/**
 * Gives every variable the lines that pass where it lies in a placement of the problem on the plane, so that variables
 * that interact begin on near lines, and lets a random one of the two serve each interaction.
 * @param shouldStop asked now and then while placing
 */
export function seat(assignment: Assignment, random: Random, coin: Coin, shouldStop: () => boolean): void {
  const { problem, crossings } = assignment
  const active = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  const columns = Math.ceil(Math.sqrt(active.length))
  const options = { columns, rows: Math.ceil(active.length / columns), effort: DEFAULTS.effort }
  const { x, y } = placeProblem(problem, active, random, options, shouldStop)
  const spread = spreadOf(assignment)
  const lineAt = (side: 0 | 1, coordinate: number): number =>
    Math.floor((0.5 + (coordinate - 0.5) * spread) * crossings.counts[side])
  for (const v of active) {
    assignment.begin()
    assignment.move(2 * v, lineAt(0, x[v]!))
    assignment.begin()
    assignment.move(2 * v + 1, lineAt(1, y[v]!))
  }
  for (let k = 0; k < problem.ends.length / 2; k++) {
    assignment.begin()
    if (coin.below(2) === 0) assignment.flip(k)
  }
}
