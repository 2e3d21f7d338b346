import type { Random } from '../random'
import { giveOuterHalves } from './gifts'
import { growFromNeighbour } from './grow'
import type { SearchState } from './state'
import { trimChain } from './trim'

/** How many neighbours a tree is grown from, of which the lightest is kept. */
const LARGEST_STARTS = 3

/** Picks up to `LARGEST_STARTS` placed neighbours at random (reservoir sampling); returns how many. */
function pickStarts(state: SearchState, variable: number, random: Random, starts: Int32Array): number {
  const { problem, chains } = state
  let seen = 0
  for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++) {
    const u = problem.targets[p]!
    if (chains.length[u] === 0) continue
    const slot = seen < starts.length ? seen : random.below(seen + 1)
    if (slot < starts.length) starts[slot] = u
    seen++
  }
  return Math.min(seen, starts.length)
}

/** Reroutes one variable at a time; holds the small scratch that this needs. */
export class Rerouter {
  private readonly starts = new Int32Array(LARGEST_STARTS)

  constructor(
    private readonly state: SearchState,
    private readonly random: Random,
  ) {}

  /**
   * Gives a variable without a chain the lightest of a few trees that reach all its placed neighbours.
   * @returns the number of qubits, 0 when no tree reaches them all (or no neighbour is placed): the chain stays empty
   */
  grow(variable: number): number {
    const { state, starts } = this
    const count = pickStarts(state, variable, this.random, starts)
    let best = Infinity
    let size = 0
    for (let i = 0; i < count; i++) {
      const weight = growFromNeighbour(state, variable, starts[i]!, best)
      if (weight >= best) continue
      best = weight
      size = state.treeSize
      state.bestTree.set(state.tree.subarray(0, size))
    }
    for (let i = 0; i < size; i++) state.chains.add(variable, state.bestTree[i]!)
    return size
  }

  /**
   * Replaces the chain of a variable by a new one under the present weights, trims it and shares it out. A variable
   * that cannot be routed keeps its chain. Returns whether it was routed.
   */
  negotiate(variable: number): boolean {
    const { state } = this
    const oldLength = this.save(variable)
    if (this.grow(variable) === 0) {
      this.restore(variable, oldLength)
      return false
    }
    trimChain(state, variable)
    giveOuterHalves(state, variable, false)
    return true
  }

  /**
   * Tries a new chain through free qubits only and keeps it when it is not longer than the old one; then evens out
   * lengths with the partners. No chain but this one grows beyond its length, and the total never grows.
   */
  shorten(variable: number): void {
    const { state } = this
    const { problem, chains } = state
    const oldLength = this.save(variable)
    if (this.grow(variable) > 0) trimChain(state, variable)
    const length = chains.length[variable]!
    if (length === 0 || length > oldLength) {
      chains.drop(variable)
      this.restore(variable, oldLength)
      return
    }
    giveOuterHalves(state, variable, true)
    for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++)
      trimChain(state, problem.targets[p]!)
  }

  private save(variable: number): number {
    const { chains, saved } = this.state
    const length = chains.copyChain(variable, saved)
    chains.drop(variable)
    return length
  }

  private restore(variable: number, length: number): void {
    for (let i = length - 1; i >= 0; i--) this.state.chains.add(variable, this.state.saved[i]!)
  }
}
