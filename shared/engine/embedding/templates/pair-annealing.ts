import type { Random } from '../../random'
import type { Watch } from '../progress'
import type { FilledPairing } from './fill'
import type { Pairing } from './matching'
import { COST_MASK, COSTS, UNMET_UNIT } from './pair-costs'
import type { PairCosts } from './pair-costs'

export interface Cooling {
  /** Moves proposed in all. */
  readonly moves: number
  /** First and last temperature, in units of one unmet pair. */
  readonly hot: number
  readonly cold: number
}

/** Moves between two looks at the clock. */
const MOVES_PER_LOOK = 2048

/** Share of moves that take a spare run rather than exchange runs between two chains. */
const REPLACE_SHARE = 0.4

/** Share of moves that begin with a chain that has an unmet pair or no corner. */
const TROUBLED_SHARE = 0.6

/**
 * Anneals the choice of one vertical and one horizontal run for each of n chains that are all to meet (costs in
 * `pair-costs`). A move costs time proportional to n; the sum of each chain's pair costs is kept throughout.
 */
export class PairAnnealer {
  private readonly n: number
  private readonly verticalOf: Int32Array
  private readonly horizontalOf: Int32Array
  private readonly spareVerticals: Int32Array
  private readonly spareHorizontals: Int32Array
  /** By chain: the cost of its pairs, with the number of unmet ones above it. */
  private readonly pairs: Int32Array
  /** Chains with an unmet pair or no corner, and by chain its place among them or −1. */
  private readonly troubled: Int32Array
  private readonly troubledPlace: Int32Array
  private troubledCount = 0
  private readonly state = new Int32Array(1)

  constructor(
    private readonly costs: PairCosts,
    start: FilledPairing,
    random: Random,
  ) {
    this.n = start.verticals.length
    this.verticalOf = start.verticals.slice()
    this.horizontalOf = start.horizontals.slice()
    this.spareVerticals = start.spareVerticals.slice()
    this.spareHorizontals = start.spareHorizontals.slice()
    this.pairs = new Int32Array(this.n)
    this.troubled = new Int32Array(this.n)
    this.troubledPlace = new Int32Array(this.n).fill(-1)
    this.state[0] = random.uint32() | 1
    for (let i = 0; i < this.n; i++) {
      this.pairs[i] = this.pairsOf(i)
      this.noteTrouble(i)
    }
  }

  /** The chains as they are now. */
  pairing(): Pairing {
    return { verticals: this.verticalOf.slice(), horizontals: this.horizontalOf.slice() }
  }

  /** Number of chains with an unmet pair or no corner. */
  get trouble(): number {
    return this.troubledCount
  }

  get cost(): number {
    let sum = 0
    for (let i = 0; i < this.n; i++) sum += (this.pairs[i]! & COST_MASK) / 2 + this.cornerCost(i)
    return sum
  }

  private cornerCost(i: number): number {
    return this.costs.corner[this.verticalOf[i]! * this.costs.width + this.horizontalOf[i]!]!
  }

  private pairCost(i: number, j: number): number {
    const { crossing, width } = this.costs
    const a = crossing[this.verticalOf[i]! * width + this.horizontalOf[j]!]!
    const b = crossing[this.verticalOf[j]! * width + this.horizontalOf[i]!]!
    return a < b ? a : b
  }

  private pairsOf(i: number): number {
    const { verticalOf, horizontalOf, n } = this
    const { crossing, transposed, width, rows } = this.costs
    const row = verticalOf[i]! * width
    const column = horizontalOf[i]! * rows
    let sum = 0
    for (let j = 0; j < n; j++) {
      const a = crossing[row + horizontalOf[j]!]!
      const b = transposed[column + verticalOf[j]!]!
      sum += a < b ? a : b
    }
    return sum - crossing[row + horizontalOf[i]!]!
  }

  private noteTrouble(i: number): void {
    const { troubled, troubledPlace } = this
    const place = troubledPlace[i]!
    const is = this.pairs[i]! >= UNMET_UNIT || this.cornerCost(i) === COSTS.noCorner
    if (is === place >= 0) return
    if (is) {
      troubledPlace[i] = this.troubledCount
      troubled[this.troubledCount++] = i
      return
    }
    const last = troubled[--this.troubledCount]!
    troubled[place] = last
    troubledPlace[last] = place
    troubledPlace[i] = -1
  }

  /** Takes chain i's pair costs out of the sums of all other chains, or puts them in. */
  private spread(i: number, sign: 1 | -1): void {
    const { pairs, verticalOf, horizontalOf, n } = this
    const { crossing, transposed, width, rows } = this.costs
    const row = verticalOf[i]! * width
    const column = horizontalOf[i]! * rows
    const own = pairs[i]!
    for (let j = 0; j < n; j++) {
      const a = crossing[row + horizontalOf[j]!]!
      const b = transposed[column + verticalOf[j]!]!
      pairs[j]! += sign * (a < b ? a : b)
    }
    pairs[i] = own
  }

  /** xorshift32 (Marsaglia, Xorshift RNGs, 2003), begun from the given random numbers. */
  private below(bound: number): number {
    let x = this.state[0]!
    x ^= x << 13
    x ^= x >>> 17
    x ^= x << 5
    this.state[0] = x
    return Math.floor(((x >>> 0) / 4294967296) * bound)
  }

  private accepts(change: number, temperature: number): boolean {
    return change <= 0 || this.below(1 << 24) < Math.exp(-change / temperature) * (1 << 24)
  }

  private pick(): number {
    const { troubledCount } = this
    const first = troubledCount > 0 && this.below(1024) < TROUBLED_SHARE * 1024
    return first ? this.troubled[this.below(troubledCount)]! : this.below(this.n)
  }

  /** Exchanges a run of chain i for a spare one. */
  private replace(i: number, runOf: Int32Array, spares: Int32Array, temperature: number): void {
    const s = this.below(spares.length)
    const old = runOf[i]!
    const before = (this.pairs[i]! & COST_MASK) + this.cornerCost(i)
    runOf[i] = spares[s]!
    const pairs = this.pairsOf(i)
    const change = (pairs & COST_MASK) + this.cornerCost(i) - before
    const accepted = this.accepts(change, temperature)
    runOf[i] = old
    if (!accepted) return
    this.spread(i, -1)
    runOf[i] = spares[s]!
    spares[s] = old
    this.spread(i, 1)
    this.pairs[i] = pairs
    for (let j = 0; j < this.n; j++) this.noteTrouble(j)
  }

  private exchange(i: number, k: number, runOf: Int32Array): void {
    const run = runOf[i]!
    runOf[i] = runOf[k]!
    runOf[k] = run
  }

  private costOfBoth(i: number, k: number): number {
    const pairs = (this.pairs[i]! + this.pairs[k]! - this.pairCost(i, k)) & COST_MASK
    return pairs + this.cornerCost(i) + this.cornerCost(k)
  }

  /** Exchanges the runs of one orientation between chains i and k. */
  private swap(i: number, k: number, runOf: Int32Array, temperature: number): void {
    const { pairs } = this
    const before = this.costOfBoth(i, k)
    const [oldI, oldK] = [pairs[i]!, pairs[k]!]
    this.exchange(i, k, runOf)
    pairs[i] = this.pairsOf(i)
    pairs[k] = this.pairsOf(k)
    const [newI, newK] = [pairs[i]!, pairs[k]!]
    const change = this.costOfBoth(i, k) - before
    if (!this.accepts(change, temperature)) {
      this.exchange(i, k, runOf)
      pairs[i] = oldI
      pairs[k] = oldK
      return
    }
    this.exchange(i, k, runOf)
    this.spread(i, -1)
    this.spread(k, -1)
    this.exchange(i, k, runOf)
    this.spread(i, 1)
    this.spread(k, 1)
    pairs[i] = newI
    pairs[k] = newK
    for (let j = 0; j < this.n; j++) this.noteTrouble(j)
  }

  private move(temperature: number): void {
    const i = this.pick()
    const upright = this.below(2) === 0
    const runOf = upright ? this.verticalOf : this.horizontalOf
    const spares = upright ? this.spareVerticals : this.spareHorizontals
    if (spares.length > 0 && this.below(1024) < REPLACE_SHARE * 1024) return this.replace(i, runOf, spares, temperature)
    const k = this.below(this.n)
    if (k !== i) this.swap(i, k, runOf, temperature)
  }

  /** Runs one schedule; ends early when the watch says so. Returns whether it ran to its end. */
  run({ moves, hot, cold }: Cooling, watch: Watch): boolean {
    if (this.n < 2) return true
    const rounds = Math.ceil(moves / MOVES_PER_LOOK)
    for (let round = 0; round < rounds; round++) {
      if (watch.shouldStop(this.troubledCount)) return false
      const temperature = COSTS.unmet * hot * (cold / hot) ** (round / Math.max(1, rounds - 1))
      for (let m = 0; m < MOVES_PER_LOOK; m++) this.move(temperature)
    }
    return true
  }
}
