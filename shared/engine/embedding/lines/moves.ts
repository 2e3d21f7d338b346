import { degreeOf } from '../../graph/graph'
import type { Assignment } from './assignment'
import type { Coin } from './coin'

const DEFAULTS = {
  /** Shares of the kinds of move; the rest swaps both lines of two variables. */
  flip: 0.45,
  move: 0.25,
  swap: 0.28,
  /** Share of line moves that bring a variable near a partner. */
  nearPartner: 0.8,
  /** How near, in lines. */
  partnerRadius: 2,
  /** How often a part without overuse is passed over in favour of another random one. */
  focus: 0.9,
}

/** More than the lines that are ever like each other; the settling of equals begins at a random one. */
const TURNS = 256

/** Makes random changes to an assignment of a problem that has interactions. */
export class Mover {
  /** Variables that have interactions. */
  private readonly active: Int32Array

  constructor(
    private readonly assignment: Assignment,
    private readonly coin: Coin,
  ) {
    const { problem } = assignment
    this.active = Int32Array.from({ length: problem.order }, (_, v) => v).filter((v) => degreeOf(problem, v) > 0)
  }

  private anyVariable(): number {
    return this.active[this.coin.below(this.active.length)]!
  }

  /** A part that its variable needs. */
  private anyPart(): number {
    const part = 2 * this.anyVariable() + this.coin.below(2)
    return this.assignment.needs(part) > 0 ? part : part ^ 1
  }

  private lineNear(side: number, line: number, radius: number): number {
    const low = Math.max(0, line - radius)
    const high = Math.min(this.assignment.crossings.counts[side]! - 1, line + radius)
    return low + this.coin.below(high - low + 1)
  }

  private settleNearPartner(part: number): void {
    const { start, partner, line } = this.assignment
    const v = part >> 1
    const side = part & 1
    const u = partner[start[v]! + this.coin.below(start[v + 1]! - start[v]!)]!
    const near = this.lineNear(side, line[2 * u + side]!, DEFAULTS.partnerRadius)
    this.assignment.settle(part, near, this.coin.below(TURNS))
  }

  private swap(a: number, b: number): void {
    const { assignment } = this
    const line = assignment.line[a]!
    assignment.move(a, assignment.line[b]!)
    assignment.move(b, line)
  }

  /** Frees a part from one of its interactions. A part that was not needed before may be anywhere, so it is placed. */
  private flipOneOf(part: number): void {
    const { assignment, coin } = this
    const { start, middle, problem } = assignment
    const v = part >> 1
    const from = part & 1 ? middle[v]! : start[v]!
    const to = part & 1 ? start[v + 1]! : middle[v]!
    const k = assignment.edgeAt(from + coin.below(to - from))
    assignment.flip(k)
    const side = assignment.sideOf(k)
    const lower = 2 * problem.ends[2 * k]! + side
    const higher = 2 * problem.ends[2 * k + 1]! + 1 - side
    if (assignment.needs(lower) === 1) this.settleNearPartner(lower)
    if (assignment.needs(higher) === 1) this.settleNearPartner(higher)
  }

  /** Makes one random change. @param radius largest distance of a line from where it was, in lines */
  make(radius: number): void {
    const { assignment, coin } = this
    let part = this.anyPart()
    if (!assignment.isOverused(part) && coin.float() < DEFAULTS.focus) part = this.anyPart()
    const kind = coin.float()
    if (kind < DEFAULTS.flip) this.flipOneOf(part)
    else if (kind < DEFAULTS.flip + DEFAULTS.move) {
      if (coin.float() < DEFAULTS.nearPartner) this.settleNearPartner(part)
      else assignment.settle(part, this.lineNear(part & 1, assignment.line[part]!, radius), coin.below(TURNS))
    } else {
      const other = 2 * this.anyVariable() + (part & 1)
      this.swap(part, other)
      if (kind >= DEFAULTS.flip + DEFAULTS.move + DEFAULTS.swap) this.swap(part ^ 1, other ^ 1)
    }
  }
}
