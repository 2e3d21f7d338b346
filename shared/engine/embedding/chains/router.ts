import type { Random } from '../../random'
import { markTouches } from './grow'
import { settleTree } from './settle'
import type { Settling } from './settle'
import { FAR } from './costs'
import type { ChainState } from './state'

const MOST_STARTS = 8

/** Reroutes one variable at a time. */
export class Router {
  /** Partners that a tree is grown from, of which the cheapest is kept; at most MOST_STARTS. */
  mostStarts = 3
  private readonly starts = new Int32Array(MOST_STARTS)

  constructor(
    readonly state: ChainState,
    private readonly random: Random,
  ) {}

  /** Draws up to `most` placed partners (reservoir sampling); returns how many. */
  private drawStarts(variable: number, most: number): number {
    const { state, starts, random } = this
    const first = state.partnerOffsets[variable]!
    let seen = 0
    for (let p = first; p < state.partnerOffsets[variable + 1]!; p++) {
      if (state.head[state.partners[p]!]! < 0) continue
      const slot = seen < most ? seen : random.below(seen + 1)
      if (slot < most) starts[slot] = p - first
      seen++
    }
    return Math.min(seen, most)
  }

  /** Leaves the cheapest of a few trees in `state.tree`; returns its size, 0 when there is none. */
  private grow(variable: number, placed: number): number {
    const { state, starts } = this
    const count = this.drawStarts(variable, this.mostStarts)
    let ceiling = FAR
    let best = 0
    for (let i = 0; i < count; i++) {
      const size = state.grow(variable, starts[i]!, placed, ceiling)
      if (size === 0) continue
      ceiling = state.treeCost
      best = size
      if (i === count - 1) return best
      for (let j = 0; j < size; j++) {
        state.bestTree[j] = state.tree[j]!
        state.bestParent[j] = state.parent[state.tree[j]!]!
      }
    }
    for (let j = 0; j < best; j++) {
      state.tree[j] = state.bestTree[j]!
      state.parent[state.bestTree[j]!] = state.bestParent[j]!
    }
    return best
  }

  /** Gives the variable a new chain under the present costs. Without a way it keeps its chain. Returns success. */
  reroute(variable: number, settling: Settling = ANY): boolean {
    const { state } = this
    const saved = state.copyChain(variable, state.saved)
    state.drop(variable)
    const placed = markTouches(state, variable)
    const size = placed > 0 ? this.grow(variable, placed) : 0
    if (size > 0 && size <= state.freeRecords && settleTree(state, variable, size, settling)) return true
    for (let i = saved - 1; i >= 0; i--) state.add(variable, state.saved[i]!)
    return false
  }
}

const ANY: Settling = { longest: Infinity, balanced: false }
