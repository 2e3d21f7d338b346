import type { Random } from '../../random'
import type { Attempt } from '../method'
import type { Watch } from '../progress'
import { fenceAllBut, isMet, refreshCosts, shuffle } from './negotiate'
import type { Router } from './router'
import type { ChainState } from './state'

export const SHORTENING = {
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

/** A set of chains around one, and all that it may change, with what they were. */
class Ball {
  readonly members: Int32Array
  size = 0
  /** Members first, then their other partners. */
  touched: Int32Array
  touchedCount = 0
  private readonly seen: Int32Array
  private now = 0
  private readonly saved: Int32Array

  constructor(private readonly state: ChainState) {
    this.members = new Int32Array(state.variables)
    this.touched = new Int32Array(state.variables)
    this.seen = new Int32Array(state.variables)
    this.saved = new Int32Array(state.qubits)
  }

  /** Gathers up to `most` chains breadth first from the centre, in random order of partners. */
  gather(centre: number, most: number, movable: Uint8Array, random: Random): void {
    const { state, members, seen } = this
    const now = ++this.now
    this.size = 1
    members[0] = centre
    seen[centre] = now
    for (let i = 0; i < this.size && this.size < most; i++) {
      const first = state.partnerOffsets[members[i]!]!
      const count = state.partnerOffsets[members[i]! + 1]! - first
      const from = count > 0 ? random.below(count) : 0
      for (let j = 0; j < count && this.size < most; j++) {
        const u = state.partners[first + ((from + j) % count)]!
        if (seen[u] === now || !movable[u]) continue
        seen[u] = now
        members[this.size++] = u
      }
    }
    this.gatherTouched(now)
  }

  private gatherTouched(now: number): void {
    const { state, members, touched, seen } = this
    this.touchedCount = 0
    for (let i = 0; i < this.size; i++) touched[this.touchedCount++] = members[i]!
    for (let i = 0; i < this.size; i++) {
      for (let p = state.partnerOffsets[members[i]!]!; p < state.partnerOffsets[members[i]! + 1]!; p++) {
        const u = state.partners[p]!
        if (seen[u] === now) continue
        seen[u] = now
        touched[this.touchedCount++] = u
      }
    }
  }

  save(): void {
    let at = 0
    for (let i = 0; i < this.touchedCount; i++) {
      const length = this.state.copyChain(this.touched[i]!, this.saved, at + 1)
      this.saved[at] = length
      at += length + 1
    }
  }

  restore(): void {
    const { state, saved, touched } = this
    for (let i = 0; i < this.touchedCount; i++) state.drop(touched[i]!)
    let at = 0
    for (let i = 0; i < this.touchedCount; i++) {
      const length = saved[at]!
      for (let j = length; j >= 1; j--) state.add(touched[i]!, saved[at + j]!)
      at += length + 1
    }
  }

  get order(): Int32Array {
    return this.members.subarray(0, this.size)
  }
}

/** Renegotiates the members among themselves. Returns whether they are free of overlap and complete again. */
function renegotiate(state: ChainState, router: Router, ball: Ball, random: Random): boolean {
  fenceAllBut(state, ball.order)
  refreshCosts(state, random, SHORTENING.ballPenalty)
  let penalty = SHORTENING.ballPenalty
  for (let pass = 0; pass < SHORTENING.ballPasses; pass++) {
    state.setPenalty(penalty)
    const order = ball.order
    shuffle(order, random)
    for (const v of order) if (pass === 0 || state.isConflicted(v)) router.reroute(v)
    if (state.overlap === 0) break
    penalty *= SHORTENING.ballGrowth
  }
  return state.overlap === 0
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
    ball.gather(
      variables[random.below(variables.length)]!,
      SHORTENING.smallestBall + random.below(span),
      movable,
      random,
    )
    const before = burden(state, ball.touched, ball.touchedCount, exponent)
    ball.save()
    const done = renegotiate(state, router, ball, random) && ball.order.every((v) => isMet(state, v))
    const after = burden(state, ball.touched, ball.touchedCount, exponent)
    if (!done || after > before) ball.restore()
    idle = done && after < before ? 0 : idle + 1
  }
  offer()
}
