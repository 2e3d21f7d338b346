import type { Graph } from '../../graph/graph'
import { degreeOf } from '../../graph/graph'
import type { Crossings } from './crossings'

/** Low end of an empty interval: larger than every place on a line. */
const NOWHERE = 32767

/** Energy of a crossing without a coupler; an unmet interaction has two. */
export const MISSING_WEIGHT = 4

/** Fields of a record of the undo log. */
const RECORD = 5

/**
 * Each variable has one vertical and one horizontal line, and each interaction one of its two variables whose vertical
 * part serves it: that vertical part crosses the horizontal part of the other. The part of variable v on side s (0
 * vertical, 1 horizontal) has the number 2v + s. A part takes the shortest interval of its line that holds all
 * crossings it is needed at, and the corner, where its line crosses the variable's other line, when the other part is
 * needed too; a part that is not needed takes nothing.
 *
 * Kept incrementally, in whole numbers: `length`, Σ qubits of all intervals; `pairs`, Σ over qubits of use·(use − 1)/2
 * (a broken qubit has one use to begin with) + missing couplers inside intervals; `missing`, crossings and corners
 * without a coupler, each counted once for either part. The intervals are an embedding when `pairs` and `missing` are 0.
 */
export class Assignment {
  length = 0
  pairs = 0
  missing = 0
  private lengthWeight = 0
  private pairWeight = 1
  /** By part: its line (numbered within its side), and its interval of places, empty where low > high. */
  readonly line: Int32Array
  readonly low: Int32Array
  readonly high: Int32Array
  /** By slot: number of intervals on it, one more where the qubit is broken. */
  readonly use: Int32Array
  /**
   * Interactions of variable v stand at start[v] … start[v + 1] − 1; those that its vertical part is needed for come
   * first, up to middle[v] − 1. `partner` is the other variable.
   */
  readonly start: Uint32Array
  readonly middle: Uint32Array
  readonly partner: Int32Array
  /** 2k or 2k + 1 for the end of edge k that stands at a position, and where it stands now. */
  private readonly half: Int32Array
  private readonly positionOf: Int32Array
  /** By part: beginning of its line's row in the table of places, first slot of its line, crossings not to be had. */
  private readonly row: Int32Array
  private readonly base: Int32Array
  private readonly absent: Int32Array
  /** What the present move changed: part, line, low, high, absent as they were, or −1 − k for a flip of edge k. */
  private readonly log: Int32Array
  private logged = 0
  private lengthBefore = 0
  private pairsBefore = 0
  private missingBefore = 0

  /** All variables on line 0 of either side, each interaction served by the vertical part of its lower variable. */
  constructor(
    readonly problem: Graph,
    readonly crossings: Crossings,
  ) {
    const { order, offsets, targets, edgeIds } = problem
    this.line = new Int32Array(2 * order)
    this.low = new Int32Array(2 * order).fill(NOWHERE)
    this.high = new Int32Array(2 * order).fill(-1)
    this.use = Int32Array.from(crossings.broken)
    this.start = offsets
    this.middle = offsets.slice(0, order)
    this.partner = Int32Array.from(targets)
    this.half = Int32Array.from(edgeIds)
    this.positionOf = new Int32Array(targets.length)
    this.row = new Int32Array(2 * order)
    this.base = new Int32Array(2 * order)
    this.absent = new Int32Array(2 * order)
    let mostNeighbours = 0
    for (let v = 0; v < order; v++) mostNeighbours = Math.max(mostNeighbours, degreeOf(problem, v))
    this.log = new Int32Array(RECORD * (4 * mostNeighbours + 32))
    this.indexInteractions()
    for (let part = 0; part < 2 * order; part++) this.place(part, 0)
    for (let part = 0; part < 2 * order; part++) this.refresh(part)
    this.begin()
  }

  /** Neighbours are ascending, so the lower ones come first: those that serve; turned so that the higher ones do. */
  private indexInteractions(): void {
    const { problem, start, middle, partner, half, positionOf } = this
    for (let v = 0; v < problem.order; v++) {
      const first = start[v]!
      const end = start[v + 1]!
      partner.subarray(first, end).reverse()
      half.subarray(first, end).reverse()
      let position = first
      while (position < end && partner[position]! > v) position++
      middle[v] = position
      for (let p = first; p < end; p++) {
        half[p] = 2 * half[p]! + (partner[p]! > v ? 0 : 1)
        positionOf[half[p]!] = p
      }
    }
  }

  private place(part: number, line: number): void {
    const { counts, rows, slotOf, first } = this.crossings
    const side = part & 1
    this.line[part] = line
    this.row[part] = rows[side]! + line * counts[1 - side]!
    this.base[part] = slotOf[first[side]! + line]!
  }

  /** Number of crossings that a part is needed at, without the corner. */
  needs(part: number): number {
    const v = part >> 1
    return part & 1 ? this.start[v + 1]! - this.middle[v]! : this.middle[v]! - this.start[v]!
  }

  /** Side of the part of the lower variable that interaction k needs; that of the higher one is the other side. */
  sideOf(k: number): number {
    return this.positionOf[2 * k]! < this.middle[this.problem.ends[2 * k]!]! ? 0 : 1
  }

  /** The edge at a position of the lists. */
  edgeAt(position: number): number {
    return this.half[position]! >> 1
  }

  /** Whether a qubit of the part's interval is in another interval too, or broken. */
  isOverused(part: number): boolean {
    const { use } = this
    const base = this.base[part]!
    const last = base + this.high[part]!
    for (let slot = base + this.low[part]!; slot <= last; slot++) if (use[slot]! > 1) return true
    return false
  }

  /** Sets what `settle` weighs lines by: energy of a qubit, and of a pair of intervals on one. */
  setWeights(lengthWeight: number, pairWeight: number): void {
    this.lengthWeight = lengthWeight
    this.pairWeight = pairWeight
  }

  /** Opens a move: what follows can be undone until the next call. */
  begin(): void {
    this.logged = 0
    this.lengthBefore = this.length
    this.pairsBefore = this.pairs
    this.missingBefore = this.missing
  }

  /** Takes back everything since `begin`. */
  undo(): void {
    const { log } = this
    for (let at = this.logged - RECORD; at >= 0; at -= RECORD) {
      const part = log[at]!
      if (part < 0) this.turn(-1 - part)
      else this.restore(part, log[at + 1]!, log[at + 2]!, log[at + 3]!, log[at + 4]!)
    }
    this.logged = 0
    this.length = this.lengthBefore
    this.pairs = this.pairsBefore
    this.missing = this.missingBefore
  }

  private restore(part: number, line: number, low: number, high: number, absent: number): void {
    if (line === this.line[part]) this.stretch(part, low, high)
    else {
      this.stretch(part, NOWHERE, -1)
      this.place(part, line)
      this.stretch(part, low, high)
    }
    this.absent[part] = absent
  }

  private remember(part: number): void {
    const { log, logged } = this
    log[logged] = part
    log[logged + 1] = this.line[part]!
    log[logged + 2] = this.low[part]!
    log[logged + 3] = this.high[part]!
    log[logged + 4] = this.absent[part]!
    this.logged = logged + RECORD
  }

  /** Gives a part another interval of its line, and keeps use, length and pairs up to date. */
  private stretch(part: number, low: number, high: number): void {
    const { use } = this
    const { gaps } = this.crossings
    const base = this.base[part]!
    const oldLow = this.low[part]!
    const oldHigh = this.high[part]!
    let pairs = this.pairs
    if (low > oldHigh || high < oldLow) {
      for (let slot = base + oldLow; slot <= base + oldHigh; slot++) pairs -= --use[slot]!
      for (let slot = base + low; slot <= base + high; slot++) pairs += use[slot]!++
    } else {
      for (let slot = base + oldLow; slot < base + low; slot++) pairs -= --use[slot]!
      for (let slot = base + high + 1; slot <= base + oldHigh; slot++) pairs -= --use[slot]!
      for (let slot = base + low; slot < base + oldLow; slot++) pairs += use[slot]!++
      for (let slot = base + oldHigh + 1; slot <= base + high; slot++) pairs += use[slot]!++
    }
    if (oldLow <= oldHigh) {
      pairs -= gaps[base + oldHigh]! - gaps[base + oldLow]!
      this.length -= oldHigh - oldLow + 1
    }
    if (low <= high) {
      pairs += gaps[base + high]! - gaps[base + low]!
      this.length += high - low + 1
    }
    this.pairs = pairs
    this.low[part] = low
    this.high[part] = high
  }

  /** Finds the interval of a part from all that it is needed for. */
  private refresh(part: number): void {
    const { line, start, middle, partner } = this
    const { place } = this.crossings
    const v = part >> 1
    const side = part & 1
    const from = side ? middle[v]! : start[v]!
    const to = side ? start[v + 1]! : middle[v]!
    const row = this.row[part]!
    let low = NOWHERE
    let high = -1
    let absent = 0
    for (let position = from; position < to; position++) {
      const at = place[row + line[2 * partner[position]! + 1 - side]!]!
      if (at < 0) absent++
      else {
        if (at < low) low = at
        if (at > high) high = at
      }
    }
    if (from < to && this.needs(part ^ 1) > 0) {
      const at = place[row + line[part ^ 1]!]!
      if (at < 0) absent++
      else {
        if (at < low) low = at
        if (at > high) high = at
      }
    }
    this.missing += absent - this.absent[part]!
    this.absent[part] = absent
    if (low !== this.low[part] || high !== this.high[part]) this.stretch(part, low, high)
  }

  /** A part that was needed at place `before` of its line is now needed at `after`; −1 for a crossing not to be had. */
  private shift(part: number, before: number, after: number): void {
    if (before === after) return
    const low = this.low[part]!
    const high = this.high[part]!
    this.remember(part)
    if (before >= 0 && (before === low || before === high)) {
      this.refresh(part)
      return
    }
    if (before < 0) {
      this.absent[part]!--
      this.missing--
    }
    if (after < 0) {
      this.absent[part]!++
      this.missing++
    } else if (after < low || after > high) this.stretch(part, Math.min(low, after), Math.max(high, after))
  }

  /** Puts a part on another line of its side. */
  move(part: number, line: number): void {
    const { row, start, middle, partner } = this
    const { place } = this.crossings
    const old = this.line[part]!
    if (old === line) return
    const v = part >> 1
    const side = part & 1
    this.remember(part)
    this.stretch(part, NOWHERE, -1)
    this.place(part, line)
    this.refresh(part)
    const from = side ? middle[v]! : start[v]!
    const to = side ? start[v + 1]! : middle[v]!
    for (let position = from; position < to; position++) {
      const other = 2 * partner[position]! + 1 - side
      this.shift(other, place[row[other]! + old]!, place[row[other]! + line]!)
    }
    const other = part ^ 1
    if (from < to && this.needs(other) > 0) this.shift(other, place[row[other]! + old]!, place[row[other]! + line]!)
  }

  /**
   * Takes a part off its line and returns that of the lines `from` … `to` − 1 of its side where it costs least, of
   * equals the first from `from + turn` on.
   */
  private cheapest(part: number, from: number, to: number, turn: number): number {
    const { counts, rows, slotOf, first, place, gaps } = this.crossings
    const { line, start, middle, partner, use, lengthWeight, pairWeight } = this
    const v = part >> 1
    const side = part & 1
    const begin = side ? middle[v]! : start[v]!
    const end = side ? start[v + 1]! : middle[v]!
    const corner = begin < end && this.needs(part ^ 1) > 0 ? line[part ^ 1]! : -1
    let best = from
    let least = Infinity
    for (let i = from; i < to; i++) {
      const candidate = i + turn < to ? i + turn : i + turn - to + from
      const row = rows[side]! + candidate * counts[1 - side]!
      let low = NOWHERE
      let high = -1
      let cost = 0
      if (corner >= 0) {
        const at = place[row + corner]!
        if (at < 0) cost += MISSING_WEIGHT
        else low = high = at
      }
      for (let position = begin; position < end; position++) {
        const at = place[row + line[2 * partner[position]! + 1 - side]!]!
        if (at < 0) cost += MISSING_WEIGHT
        else {
          if (at < low) low = at
          if (at > high) high = at
        }
      }
      if (low <= high) {
        const base = slotOf[first[side]! + candidate]!
        let pairs = gaps[base + high]! - gaps[base + low]!
        for (let slot = base + low; slot <= base + high; slot++) pairs += use[slot]!
        cost += pairs * pairWeight + (high - low + 1) * lengthWeight
      }
      if (cost < least) {
        least = cost
        best = candidate
      }
    }
    return best
  }

  /** Puts a part on the cheapest of the lines that are like `line`. @param turn decides between equals, ≥ 0 */
  settle(part: number, line: number, turn: number): void {
    const { alikeFrom, alikeTo, first } = this.crossings
    const from = alikeFrom[first[part & 1]! + line]!
    const to = alikeTo[first[part & 1]! + line]!
    this.remember(part)
    this.stretch(part, NOWHERE, -1)
    const best = this.cheapest(part, from, to, turn % (to - from))
    if (best === this.line[part]) this.refresh(part)
    else this.move(part, best)
  }

  /** Lets the other variable's vertical part serve interaction k. */
  flip(k: number): void {
    const { ends } = this.problem
    this.log[this.logged] = -1 - k
    this.logged += RECORD
    const side = this.turn(k)
    this.exchange(ends[2 * k]!, ends[2 * k + 1]!, side)
    this.exchange(ends[2 * k + 1]!, ends[2 * k]!, 1 - side)
  }

  /** The part of v on side `side` is no longer needed for its interaction with u; that on the other side is. */
  private exchange(v: number, u: number, side: number): void {
    const { place } = this.crossings
    const { line, row } = this
    const left = 2 * v + side
    const taken = left ^ 1
    if (this.needs(left) === 0 || this.needs(taken) === 1) {
      this.remember(left)
      this.refresh(left)
      this.remember(taken)
      this.refresh(taken)
      return
    }
    this.release(left, place[row[left]! + line[2 * u + 1 - side]!]!)
    this.take(taken, place[row[taken]! + line[2 * u + side]!]!)
  }

  /** A part is no longer needed at one place. */
  private release(part: number, place: number): void {
    this.remember(part)
    if (place < 0) {
      this.absent[part]!--
      this.missing--
    } else if (place === this.low[part] || place === this.high[part]) this.refresh(part)
  }

  /** A part is needed at one more place. */
  private take(part: number, place: number): void {
    const low = this.low[part]!
    const high = this.high[part]!
    this.remember(part)
    if (place < 0) {
      this.absent[part]!++
      this.missing++
    } else if (place < low || place > high) this.stretch(part, Math.min(low, place), Math.max(high, place))
  }

  /** Moves both ends of edge k to the other side in the lists; returns the side where its lower end stood. */
  private turn(k: number): number {
    const { ends } = this.problem
    const side = this.turnEnd(ends[2 * k]!, 2 * k)
    this.turnEnd(ends[2 * k + 1]!, 2 * k + 1)
    return side
  }

  private turnEnd(v: number, half: number): number {
    const { middle, positionOf } = this
    const position = positionOf[half]!
    if (position < middle[v]!) {
      this.exchangePositions(position, --middle[v]!)
      return 0
    }
    this.exchangePositions(position, middle[v]!++)
    return 1
  }

  private exchangePositions(a: number, b: number): void {
    const { partner, half, positionOf } = this
    const movedPartner = partner[a]!
    const movedHalf = half[a]!
    partner[a] = partner[b]!
    half[a] = half[b]!
    partner[b] = movedPartner
    half[b] = movedHalf
    positionOf[half[a]!] = a
    positionOf[movedHalf] = b
  }
}
