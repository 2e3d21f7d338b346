import type { Assignment } from './assignment'
import type { Coin } from './coin'

/** Shares of the kinds of move; the rest swaps both lines of two variables. */
export const SHARES = {
  flip: 0.4,
  move: 0.35,
  swap: 0.18,
  near: 0.5,
  focus: 0.5,
  smart: 1,
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

function settleNearPartner(assignment: Assignment, part: number, coin: Coin): void {
  const { start, partner, line, crossings } = assignment
  const v = part >> 1
  const u = partner[start[v]! + coin.below(start[v + 1]! - start[v]!)]!
  assignment.settle(
    part,
    lineNear(crossings.counts[part & 1]!, line[2 * u + (part & 1)]!, NEAR, coin),
    coin.below(256),
  )
}

/** Makes one random change. @param radius largest distance of a line from where it was, in lines */
export function makeMove(assignment: Assignment, coin: Coin, radius: number): void {
  const { problem, crossings, line, start } = assignment
  const { order, ends } = problem
  const kind = coin.float()
  let part = coin.below(2 * order)
  if (assignment.needs(part) === 0) part ^= 1
  if (!assignment.isOverused(part) && coin.float() < SHARES.focus) {
    part = coin.below(2 * order)
    if (assignment.needs(part) === 0) part ^= 1
  }
  const v = part >> 1
  const side = part & 1
  if (kind < SHARES.flip) {
    const [from, to] = side ? [assignment.middle[v]!, start[v + 1]!] : [start[v]!, assignment.middle[v]!]
    if (from === to) return
    const k = assignment.edgeAt(from + coin.below(to - from))
    assignment.flip(k)
    if (SHARES.smart) {
      const s = assignment.sideOf(k)
      const a = 2 * ends[2 * k]! + s
      const b = 2 * ends[2 * k + 1]! + 1 - s
      if (assignment.needs(a) === 1) settleNearPartner(assignment, a, coin)
      if (assignment.needs(b) === 1) settleNearPartner(assignment, b, coin)
    }
    return
  }
  if (kind < SHARES.flip + SHARES.move) {
    if (coin.float() < SHARES.near) settleNearPartner(assignment, part, coin)
    else
      assignment.settle(part, lineNear(crossings.counts[side]!, line[part]!, radius, coin), coin.below(256))
    return
  }
  const u = coin.below(order)
  swapLines(assignment, part, 2 * u + side)
  if (kind >= SHARES.flip + SHARES.move + SHARES.swap) swapLines(assignment, part ^ 1, 2 * u + 1 - side)
}
