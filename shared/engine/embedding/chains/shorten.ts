import { shuffle } from '../../random'
import type { Random } from '../../random'
import type { Attempt } from '../method'
import type { Watch } from '../progress'
import { Ball } from './ball'
import { isMet, refreshCosts } from './negotiate'
import type { Router } from './router'
import type { ChainState } from './state'

export const SHORTENING = {
  /** Power of a chain's length in its burden: the total counts all qubits alike, more minds long chains more. */
  exponent: { 'longest chain': 2, 'total qubits': 1 },
  /** Partners that a tree is grown from. */
  starts: 3,
  /** Strict passes in a row that save nothing before the balls. */
  idlePasses: 2,
  /** How many random parts a cost may have, in 64ths: so many that ways of somewhat different length are tried. */
  spread: { strict: 4, balls: 32 },
  /** Smallest and largest number of chains that are laid anew together. */
  smallestBall: 3,
  largestBall: 12,
  /** Passes of one such negotiation, its first penalty, the growth of it, and the most. */
  ballPasses: 6,
  ballPenalty: 3,
  ballGrowth: 1.5,
  ballPenaltyMost: 10,
  /** Balls between two fresh draws of the costs. */
  ballsPerRefresh: 16,
  /** Share of the burden that must have been saved since the last offer for another. */
  offerEvery: 0.01,
  /** Annealing goes through cycles, each longer and hotter at first: share of all balls, and the first temperature. */
  cycles: [
    { share: 0.025, hottest: 0.3 },
    { share: 0.1, hottest: 1 },
    { share: 0.25, hottest: 1.5 },
    { share: 0.625, hottest: 2 },
  ],
  /** Temperature at the end of a cycle; temperatures are in qubits of a chain of mean length. */
  coldest: 0.1,
  /** Balls that fill a second of the time allotted, where a variable has one interaction: about what is done in it. */
  ballsPerSecond: 10_000,
  /** Most balls, as a multiple of the variables, and the fewest: beyond and below it is no use. */
  mostBalls: 300,
  fewestBalls: 3,
} as const

/** Variables between two looks at the clock. */
const VARIABLES_PER_LOOK = 16

/** Σ length²: falls when chains become shorter or more even. */
function unevenness({ length }: ChainState, variables: Int32Array): number {
  let sum = 0
  for (let i = 0; i < variables.length; i++) sum += length[variables[i]!]! ** 2
  return sum
}

/** Reroutes chains through free qubits, each kept when it is not longer, until passes save nothing. */
function shortenStrictly(state: ChainState, router: Router, variables: Int32Array, random: Random, watch: Watch): void {
  state.history.fill(0)
  state.fenced.fill(0)
  for (let idle = 0; idle < SHORTENING.idlePasses;) {
    const before = unevenness(state, variables)
    refreshCosts(state, random, Infinity, SHORTENING.spread.strict)
    shuffle(variables, random)
    for (let i = 0; i < variables.length; i++) {
      const v = variables[i]!
      if (i % VARIABLES_PER_LOOK === 0 && watch.shouldStop(0)) return
      if (state.length[v]! > 1) router.reroute(v, { longest: state.length[v]!, balanced: true })
    }
    idle = unevenness(state, variables) < before ? 0 : idle + 1
  }
}

/** Empties the members' chains but for one qubit of each, drawn at random. */
function strip(state: ChainState, { order }: Ball, random: Random): void {
  for (let i = 0; i < order.length; i++) {
    const v = order[i]!
    let record = state.head[v]!
    for (let skip = random.below(state.length[v]!); skip > 0; skip--) record = state.recordNext[record]!
    const kept = state.recordQubit[record]!
    state.drop(v)
    state.add(v, kept)
  }
}

/** Lays the members' chains anew, negotiated among themselves, all other chains being out of reach. */
function layAnew(state: ChainState, router: Router, ball: Ball, random: Random): void {
  let penalty: number = SHORTENING.ballPenalty
  const { order } = ball
  strip(state, ball, random)
  for (let pass = 0; pass < SHORTENING.ballPasses; pass++) {
    ball.setPenalty(penalty)
    shuffle(order, random)
    let moved = 0
    for (let i = 0; i < order.length; i++) {
      // The first pass had others still stripped.
      if (pass > 1 && !state.isConflicted(order[i]!)) continue
      router.reroute(order[i]!)
      moved++
    }
    if (moved === 0) return
    penalty = Math.min(SHORTENING.ballPenaltyMost, penalty * SHORTENING.ballGrowth)
  }
}

/** Σ length^exponent over all chains. */
function burdenOf({ length }: ChainState, exponent: number): number {
  let sum = 0
  for (let v = 0; v < length.length; v++) sum += length[v]! ** exponent
  return sum
}

/**
 * How many balls are laid: set by the time allotted through a nominal rate, not by the clock, so that the outcome is the
 * same on slow machines and fast ones that are not cut short.
 */
function ballsFor({ partners, variables: count }: ChainState, variables: Int32Array, seconds: number): number {
  const { ballsPerSecond, mostBalls, fewestBalls } = SHORTENING
  const degree = Math.max(1, partners.length / count)
  const perVariable = (seconds * ballsPerSecond) / degree / variables.length
  return Math.ceil(variables.length * Math.min(mostBalls, Math.max(fewestBalls, perVariable)))
}

/** Anneals a valid state without overlap, ball by ball. */
class BallAnnealing {
  private readonly ball: Ball
  private readonly exponent: number
  /** What one qubit more on a chain of mean length adds to the burden. */
  private readonly unit: number
  private burden: number
  private offered: number

  constructor(
    private readonly state: ChainState,
    private readonly router: Router,
    private readonly variables: Int32Array,
    private readonly attempt: ShorteningAttempt,
    private readonly offer: () => void,
  ) {
    const movable = new Uint8Array(state.variables)
    for (const v of variables) movable[v] = 1
    this.ball = new Ball(state, movable)
    this.exponent = SHORTENING.exponent[attempt.objective]
    this.unit = this.exponent * (state.qubitsUsed / state.variables) ** (this.exponent - 1)
    this.burden = this.offered = burdenOf(state, this.exponent)
  }

  /** Lays one ball anew and keeps it by the rule of Metropolis et al. (1953). */
  private step(round: number, temperature: number): void {
    const { state, ball, variables, exponent } = this
    const { random } = this.attempt
    const centre = variables[random.below(variables.length)]!
    const most = SHORTENING.smallestBall + random.below(SHORTENING.largestBall - SHORTENING.smallestBall + 1)
    if (round % 2 === 0) ball.gatherPartners(centre, most, random)
    else ball.gatherAround(centre, most)
    const before = ball.burden(exponent)
    layAnew(state, this.router, ball, random)
    const rise = ball.burden(exponent) - before
    const kept =
      state.overlap === 0 &&
      (rise <= 0 || random.float() < Math.exp(-rise / temperature)) &&
      ball.order.every((v) => isMet(state, v))
    ball.end(kept)
    if (kept) this.burden += rise
  }

  private offerIfBelow(bound: number): void {
    if (this.burden >= bound) return
    this.offered = this.burden
    this.offer()
  }

  /** One cycle of cooling. Returns whether it has saved anything. */
  cycle(rounds: number, hottest: number): boolean {
    const { state, unit, attempt } = this
    const before = this.offered
    for (let round = 0; round < rounds && !attempt.watch.shouldStop(0); round++) {
      if (round % SHORTENING.ballsPerRefresh === 0) {
        refreshCosts(state, attempt.random, SHORTENING.ballPenalty, SHORTENING.spread.balls)
        this.offerIfBelow(this.offered * (1 - SHORTENING.offerEvery))
      }
      this.step(round, unit * hottest * (SHORTENING.coldest / hottest) ** (round / rounds))
    }
    this.offerIfBelow(this.offered)
    return this.offered < before
  }
}

type ShorteningAttempt = Pick<Attempt, 'objective' | 'random' | 'watch' | 'seconds'>

/**
 * Shortens a valid embedding: strict reroutes until idle, then simulated annealing (Kirkpatrick, Gelatt & Vecchi,
 * Science 220, 1983) whose moves lay balls of neighbouring chains anew, by partners and by place in turn, until a cycle
 * saves nothing. The embedding is valid whenever `offer` is called and when it returns.
 * @param variables those whose chains may be rerouted
 */
export function shortenChains(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  attempt: ShorteningAttempt,
  offer: () => void,
): void {
  attempt.watch.phase = 'shortening'
  router.mostStarts = SHORTENING.starts
  shortenStrictly(state, router, variables, attempt.random, attempt.watch)
  offer()
  const annealing = new BallAnnealing(state, router, variables, attempt, offer)
  const balls = ballsFor(state, variables, attempt.seconds)
  for (const { share, hottest } of SHORTENING.cycles)
    if (!annealing.cycle(Math.ceil(share * balls), hottest) || attempt.watch.shouldStop(0)) return
}
