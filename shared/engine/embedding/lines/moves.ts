import type { Assignment } from './assignment'
import type { Coin } from './coin'

/** Shares of the kinds of move; the rest swaps both lines of two variables. */
const SHARES = {
  flip: 0.4,
  move: 0.35,
  swap: 0.18,
}

/** How far from a neighbour's line a part is put that is to come near it. */
const NEAR = 2

/** A line of the side within `radius` of `line`, other than it where there is one. */
function lineNear(count: number, line: number, radius: number, coin: Coin): number {
  const low = Math.max(0, line - radius)
  const high = Math.min(count - 1, line + radius)
  return low + coin.below(high - low + 1)
}

function swapLines(assignment: Assignment, a: number, b: number): void {
  const line = assignment.line[a]!
  assignment.move(a, assignment.line[b]!)
  assignment.move(b, line)
}

/** Makes one random change. @param radius largest distance of a line from where it was, in lines */
export function makeMove(assignment: Assignment, coin: Coin, radius: number): void {
  const { problem, crossings, line, partner } = assignment
  const { offsets, order } = problem
  const kind = coin.float()
  if (kind < SHARES.flip) {
    assignment.flip(coin.below(problem.ends.length >> 1))
    return
  }
  const v = coin.below(order)
  const side = coin.below(2)
  const part = 2 * v + side
  if (kind < SHARES.flip + SHARES.move) {
    const degree = offsets[v + 1]! - offsets[v]!
    if (coin.below(2) === 0 && degree > 0) {
      const u = partner[offsets[v]! + coin.below(degree)]!
      assignment.move(part, lineNear(crossings.counts[side]!, line[2 * u + side]!, NEAR, coin))
    } else assignment.move(part, lineNear(crossings.counts[side]!, line[part]!, radius, coin))
    return
  }
  const u = coin.below(order)
  swapLines(assignment, part, 2 * u + side)
  if (kind >= SHARES.flip + SHARES.move + SHARES.swap) swapLines(assignment, part ^ 1, 2 * u + 1 - side)
}
