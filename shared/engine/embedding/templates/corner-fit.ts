import type { Crossings, RunSet } from './crossings'
import { cornerTemplate } from './corner-template'
import { fillPairing } from './fill'
import type { Fitter } from './fitter'
import { PairAnnealer } from './pair-annealing'
import type { Cooling } from './pair-annealing'
import { pairCosts } from './pair-costs'
import { extentOf, rankWindows } from './windows'
import type { Extent, MatchedWindow } from './windows'

const DEFAULTS = {
  /** Windows looked at of each size: at most so many, and fewer where they hold more crossings than this in all. */
  mostWindows: 100,
  crossingsPerSize: 1e6,
  /** Factor from one size to the next. */
  growth: 1.04,
  /** Windows of the smallest size that suffices which are all fitted, for complete problems and for others. */
  fittedWindows: 8,
  fittedWindowsOfOthers: 2,
  /** A window is annealed when it holds this share of the chains as it is. */
  promising: 0.78,
  /** Sizes gone up at a time when that fails. */
  stepUp: 2,
  /** Annealings once there is a solution, for complete problems and for others. */
  refinements: 6,
  refinementsOfOthers: 2,
  /** Moves of an annealing: so many a chain and at least so many in all, but few for few pairs of chains. */
  movesPerChain: 600,
  leastMoves: 90_000,
  mostMovesPerPair: 60,
  /** Temperatures of an annealing in unmet pairs. */
  hot: 2,
  cold: 0.02,
  /** Chains beyond the runs that are grown through what the others leave free. */
  mostExtra: 3,
  /** Annealings of the largest window before giving up, and when only a first solution is asked for. */
  lastTries: 16,
  lastTriesForFirst: 3,
}

/** Sizes from n lines on, in growing steps, up to the whole machine with what qubits stand out. */
function sizesFrom(n: number, { size }: Extent): number[] {
  const sizes: number[] = []
  for (let s = Math.max(1, n); s < size; s = Math.max(s + 1, Math.round(s * DEFAULTS.growth))) sizes.push(s)
  sizes.push(size)
  return sizes
}

/** The annealing schedule of so many chains. */
function coolingOf(chains: number): Cooling {
  const { movesPerChain, leastMoves, mostMovesPerPair, hot, cold } = DEFAULTS
  const wanted = Math.max(movesPerChain * chains, leastMoves)
  return { moves: Math.min(wanted, (mostMovesPerPair * chains * (chains - 1)) / 2), hot, cold }
}

/** Lines that the runs lie on: chains beyond them would have to share one. */
function lineCount({ across, count }: RunSet): number {
  let lines = 0
  for (let r = 0; r < count; r++) if (r === 0 || across[r] !== across[r - 1]) lines++
  return lines
}

/** Fits the problem's core below the diagonals of the machine's windows. */
export class CornerFitter {
  private readonly n: number
  private readonly extent: Extent
  private readonly sizes: readonly number[]
  private readonly ranked = new Map<number, MatchedWindow[]>()

  constructor(
    private readonly fitter: Fitter,
    private readonly crossings: Crossings,
  ) {
    this.n = fitter.core.order
    this.extent = extentOf(crossings)
    this.sizes = sizesFrom(this.n, this.extent)
  }

  private rank(step: number): MatchedWindow[] {
    const known = this.ranked.get(step)
    if (known) return known
    const size = this.sizes[step]!
    const limit = Math.min(DEFAULTS.mostWindows, DEFAULTS.crossingsPerSize / (size * size))
    const windows = rankWindows(this.crossings, this.extent, size, limit, this.fitter.attempt.random)
    this.ranked.set(step, windows)
    return windows
  }

  private held(step: number): number {
    return this.rank(step)[0]!.pairing.verticals.length
  }

  private fitsAsItIs(step: number): boolean {
    let fitted = false
    const count = this.fitter.isComplete ? DEFAULTS.fittedWindows : DEFAULTS.fittedWindowsOfOthers
    for (const { window, pairing } of this.rank(step).slice(0, count)) {
      if (this.fitter.attempt.watch.shouldStop(0)) break
      if (pairing.verticals.length < this.n) break
      fitted = this.fitter.fit(cornerTemplate(window, pairing)) || fitted
    }
    return fitted
  }

  /** Anneals the best window of one size with all but `extra` chains in it. */
  private anneal(step: number, extra: number, place: number): boolean {
    const { random, watch } = this.fitter.attempt
    const { window, pairing } = this.rank(step)[place % this.rank(step).length]!
    const slots = this.n - extra
    const filled = fillPairing(window, pairing, slots)
    if (!filled) return false
    watch.phase = 'fitting the template'
    const annealer = new PairAnnealer(pairCosts(window), filled, random)
    if (!annealer.run(coolingOf(slots), watch)) return false
    return this.fitter.fit(cornerTemplate(window, annealer.pairing()))
  }

  /**
   * First size, as a step, whose best window holds so many chains as it is; the last one when none does. Larger windows
   * hold more, nearly always, so this halves the range.
   */
  private firstHolding(chains: number): number {
    let low = 0
    let high = this.sizes.length - 1
    if (this.held(high) < chains) return high
    while (low < high) {
      const middle = (low + high) >> 1
      if (this.held(middle) >= chains) high = middle
      else low = middle + 1
    }
    return low
  }

  /** Anneals again: in smaller windows for as long as they do, then in others of the size that did last. */
  private refine(from: number, refinements: number): void {
    let step = from
    let smaller = from > 0
    for (let tries = 1; tries <= refinements; tries++) {
      if (this.fitter.attempt.watch.shouldStop(0)) return
      const next = smaller ? step - 1 : step
      const done = this.anneal(next, 0, smaller ? 0 : tries)
      if (done) step = next
      smaller = smaller && done && step > 0
    }
  }

  /** Anneals in the smallest window that looks promising, then in larger ones, until one does. */
  private firstAnnealed(onlyFirst: boolean): boolean {
    const { watch } = this.fitter.attempt
    const last = this.sizes.length - 1
    const others = this.fitter.isComplete ? DEFAULTS.refinements : DEFAULTS.refinementsOfOthers
    const refinements = onlyFirst ? 0 : others
    const lastTries = onlyFirst ? DEFAULTS.lastTriesForFirst : DEFAULTS.lastTries
    for (let step = this.firstHolding(DEFAULTS.promising * this.n); step < last; step += DEFAULTS.stepUp) {
      if (watch.shouldStop(0)) return false
      if (!this.anneal(step, 0, 0)) continue
      this.refine(step, refinements)
      return true
    }
    for (let tries = 0; tries < lastTries; tries++) {
      if (watch.shouldStop(0)) return false
      if (!this.anneal(last, tries % (DEFAULTS.mostExtra + 1), tries)) continue
      this.refine(last, refinements)
      return true
    }
    return false
  }

  /** Chains that the best window of the whole machine holds as it is. */
  heldByAll(): number {
    return this.held(this.sizes.length - 1)
  }

  /**
   * Offers what can be found; returns whether anything was valid.
   * @param onlyFirst leave out what may improve it
   */
  run(onlyFirst = false): boolean {
    const { vertical, horizontal } = this.crossings
    const lines = Math.min(lineCount(vertical), lineCount(horizontal))
    if (this.n === 0 || this.n > lines + DEFAULTS.mostExtra) return false
    const step = this.firstHolding(this.n)
    const whole = this.held(step) >= this.n && this.fitsAsItIs(step)
    if (whole && (onlyFirst || this.sizes[step]! <= this.n * DEFAULTS.growth ** 2)) return true
    return this.firstAnnealed(onlyFirst) || whole
  }
}
