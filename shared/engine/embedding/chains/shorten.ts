import type { Random } from '../../random'
import type { Attempt } from '../method'
import type { Watch } from '../progress'
import { Ball } from './ball'
import { fenceAllBut, isMet, refreshCosts, shuffle } from './negotiate'
import type { Router } from './router'
import type { ChainState } from './state'

export const SHORTENING = {
  /** Partners that a tree is grown from. */
  starts: 3,
  /** Power of a chain's length in its burden: the total counts all qubits alike, more minds long chains more. */
  exponent: { 'longest chain': 2, 'total qubits': 1 },
  /** Strict passes in a row that save nothing before the balls. */
  idlePasses: 2,
  /** Smallest and largest number of chains that are renegotiated together. */
  smallestBall: 6,
  largestBall: 20,
  /** Passes of one such negotiation, its first penalty and the growth of it. */
  ballPasses: 8,
  ballPenalty: 1.5,
  ballGrowth: 1.6,
  /** Balls without a gain, as a multiple of the variables, before shortening ends. */
  patience: 2,
}

/** What chains are judged by: long ones count more than in proportion. */
function burden({ length }: ChainState, members: Int32Array, count: number, exponent: number): number {
  let sum = 0
  for (let i = 0; i < count; i++) sum += length[members[i]!]! ** exponent
  return sum
}

/** Reroutes chains through free qubits, each kept when it is not longer, until passes save nothing. */
function shortenStrictly(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  random: Random,
  watch: Watch,
): boolean {
  state.history.fill(0)
  state.fenced.fill(0)
  for (let idle = 0; idle < SHORTENING.idlePasses;) {
    const before = burden(state, variables, variables.length, 2)
    refreshCosts(state, random, Infinity)
    shuffle(variables, random)
    for (let i = 0; i < variables.length; i++) {
      const v = variables[i]!
      if (i % 16 === 0 && watch.shouldStop(0)) return false
      if (state.length[v]! > 1) router.reroute(v, { longest: state.length[v]!, balanced: true })
    }
    idle = burden(state, variables, variables.length, 2) < before ? 0 : idle + 1
  }
  return true
}

/** Renegotiates the members among themselves, all other chains being out of reach. */
function renegotiate(state: ChainState, router: Router, ball: Ball, random: Random): void {
  fenceAllBut(state, ball.order)
  refreshCosts(state, random, SHORTENING.ballPenalty)
  let penalty = SHORTENING.ballPenalty
  for (let pass = 0; pass < SHORTENING.ballPasses; pass++) {
    state.setPenalty(penalty)
    const order = ball.order
    shuffle(order, random)
    let moved = 0
    for (const v of order) {
      if (pass > 0 && !state.isConflicted(v)) continue
      router.reroute(v)
      moved++
    }
    if (moved === 0) return
    penalty *= SHORTENING.ballGrowth
  }
}

/**
 * Shortens a valid embedding: strict reroutes until idle, then balls of neighbouring chains renegotiated and kept when
 * they are no greater burden. The embedding is valid whenever `offer` is called and when it returns.
 */
export function shortenChains(
  state: ChainState,
  router: Router,
  variables: Int32Array,
  { objective, random, watch }: Pick<Attempt, 'objective' | 'random' | 'watch'>,
  offer: () => void,
): void {
  watch.phase = 'shortening'
  router.mostStarts = SHORTENING.starts
  const exponent = SHORTENING.exponent[objective]
  if (!shortenStrictly(state, router, variables, random, watch)) return
  offer()
  const movable = new Uint8Array(state.variables)
  for (const v of variables) movable[v] = 1
  const ball = new Ball(state)
  let idle = 0
  for (let round = 0; idle < SHORTENING.patience * variables.length; round++) {
    if (watch.shouldStop(0)) break
    const span = SHORTENING.largestBall - SHORTENING.smallestBall + 1
    const centre = variables[random.below(variables.length)]!
    const most = SHORTENING.smallestBall + random.below(span)
    if (round % 2 === 0) ball.gather(centre, most, movable, random)
    else ball.gatherAround(centre, most, movable)
    const before = burden(state, ball.touched, ball.touchedCount, exponent)
    ball.save()
    renegotiate(state, router, ball, random)
    const done = state.overlap === 0 && ball.order.every((v) => isMet(state, v))
    const after = burden(state, ball.touched, ball.touchedCount, exponent)
    if (!done || after > before) ball.restore()
    idle = done && after < before ? 0 : idle + 1
  }
  offer()
}
