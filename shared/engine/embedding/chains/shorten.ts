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
  /** Smallest and largest number of chains that are renegotiated together. */
  smallestBall: 6,
  largestBall: 20,
  /** Passes of one such negotiation, its first penalty and the growth of it. */
  ballPasses: 8,
  ballPenalty: 1.5,
  ballGrowth: 1.6,
  /** Balls between two fresh draws of the tie-breaks, when what has been gained is offered too. */
  ballsPerRefresh: 32,
  /** Balls without a gain, as a multiple of the variables, before shortening ends. */
  patience: 4,
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
    refreshCosts(state, random, Infinity)
    shuffle(variables, random)
    for (let i = 0; i < variables.length; i++) {
      const v = variables[i]!
      if (i % VARIABLES_PER_LOOK === 0 && watch.shouldStop(0)) return
      if (state.length[v]! > 1) router.reroute(v, { longest: state.length[v]!, balanced: true })
    }
    idle = unevenness(state, variables) < before ? 0 : idle + 1
  }
}

/** Renegotiates the members among themselves, all other chains being out of reach. */
function renegotiate(state: ChainState, router: Router, ball: Ball, random: Random): void {
  let penalty: number = SHORTENING.ballPenalty
  const { order } = ball
  for (let pass = 0; pass < SHORTENING.ballPasses; pass++) {
    ball.setPenalty(penalty)
    shuffle(order, random)
    let moved = 0
    for (let i = 0; i < order.length; i++) {
      if (pass > 0 && !state.isConflicted(order[i]!)) continue
      router.reroute(order[i]!)
      moved++
    }
    if (moved === 0) return
    penalty *= SHORTENING.ballGrowth
  }
}

/**
 * Shortens a valid embedding: strict reroutes until idle, then balls of neighbouring chains, by partners and by place in
 * turn, renegotiated and kept when they are no greater burden. The embedding is valid whenever `offer` is called and
 * when it returns.
 * @param variables those whose chains may be rerouted
 */
export function shortenChains(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  { objective, random, watch }: Pick<Attempt, 'objective' | 'random' | 'watch'>,
  offer: () => void,
): void {
  const exponent = SHORTENING.exponent[objective]
  const span = SHORTENING.largestBall - SHORTENING.smallestBall + 1
  watch.phase = 'shortening'
  router.mostStarts = SHORTENING.starts
  shortenStrictly(state, router, variables, random, watch)
  offer()
  const movable = new Uint8Array(state.variables)
  for (const v of variables) movable[v] = 1
  const ball = new Ball(state, movable)
  let idle = 0
  let gained = false
  for (let round = 0; idle < SHORTENING.patience * variables.length && !watch.shouldStop(0); round++) {
    if (round % SHORTENING.ballsPerRefresh === 0) {
      refreshCosts(state, random, SHORTENING.ballPenalty)
      if (gained) offer()
      gained = false
    }
    const centre = variables[random.below(variables.length)]!
    const most = SHORTENING.smallestBall + random.below(span)
    if (round % 2 === 0) ball.gatherPartners(centre, most, random)
    else ball.gatherAround(centre, most)
    const before = ball.burden(exponent)
    renegotiate(state, router, ball, random)
    const whole = state.overlap === 0 && ball.order.every((v) => isMet(state, v))
    const after = ball.burden(exponent)
    ball.end(whole && after <= before)
    idle = whole && after < before ? 0 : idle + 1
    gained ||= idle === 0
  }
  offer()
}
