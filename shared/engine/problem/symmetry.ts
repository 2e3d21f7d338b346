/** Signs that a problem has several optima: changes of a state that never change its energy. */
import { edgeBetween } from '../graph/build'
import { degreeOf, type Graph } from '../graph/graph'
import { connectedComponents } from './components'
import type { Problem } from './problem'

export interface Symmetries {
  /** Variables without a field or an interaction: either value is as good. */
  readonly free: number
  /** Components of two variables or more without a field: all their spins can be turned over at once. */
  readonly mirrored: number
  /** Sets of variables, two or more each, any two of which can trade values. */
  readonly interchangeable: { readonly sets: number; readonly variables: number; readonly largest: number }
}

const DEFAULTS = {
  /** Pairs of variables compared neighbour by neighbour. */
  maxWork: 40_000_000,
}

/** Mixes a neighbour and a coupling into 32 bits; sums of these tell rows apart, up to chance. */
function mixed(neighbour: number, coupling: number, scratch: { bits: Uint32Array; value: Float64Array }): number {
  scratch.value[0] = coupling
  let x = Math.imul(neighbour + 1, 0x9e3779b1) ^ Math.imul(scratch.bits[0]!, 0x85ebca6b) ^ scratch.bits[1]!
  x = Math.imul(x ^ (x >>> 15), 0x2c1b3c6d)
  x = Math.imul(x ^ (x >>> 12), 0x297a2d39)
  return (x ^ (x >>> 15)) >>> 0
}

/** Whether swapping the values of a and b never changes the energy: equal fields, equal couplings to all others. */
function canTrade(graph: Graph, ising: Problem, a: number, b: number): boolean {
  if (ising.linear[a] !== ising.linear[b]) return false
  const { offsets, targets, edgeIds } = graph
  let [p, q] = [offsets[a]!, offsets[b]!]
  for (;;) {
    while (p < offsets[a + 1]! && targets[p] === b) p++
    while (q < offsets[b + 1]! && targets[q] === a) q++
    const [isOver, isOtherOver] = [p >= offsets[a + 1]!, q >= offsets[b + 1]!]
    if (isOver || isOtherOver) return isOver && isOtherOver
    if (targets[p] !== targets[q] || ising.values[edgeIds[p]!] !== ising.values[edgeIds[q]!]) return false
    p++
    q++
  }
}

/** Pairs that may trade: neighbours whose rows agree but for each other, and variables with equal rows. */
function* likelyPairs(graph: Graph, ising: Problem): Generator<readonly [number, number]> {
  const { order, offsets, targets, edgeIds, ends } = graph
  const value = new Float64Array(1)
  const scratch = { value, bits: new Uint32Array(value.buffer) }
  const sums = new Float64Array(order)
  for (let v = 0; v < order; v++)
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++)
      sums[v]! += mixed(targets[p]!, ising.values[edgeIds[p]!]!, scratch)
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [ends[k]!, ends[k + 1]!]
    const coupling = ising.values[k / 2]!
    if (sums[a]! - mixed(b, coupling, scratch) === sums[b]! - mixed(a, coupling, scratch)) yield [a, b]
  }
  const lastWith = new Map<string, number>()
  for (let v = 0; v < order; v++) {
    if (degreeOf(graph, v) === 0) continue
    const key = `${sums[v]} ${ising.linear[v]}`
    const before = lastWith.get(key)
    if (before !== undefined && edgeBetween(graph, before, v) < 0) yield [before, v]
    lastWith.set(key, v)
  }
}

/** Sets of the variables that can trade values, or none counted beyond the work allowed. */
function interchangeable(graph: Graph, ising: Problem, maxWork: number): Symmetries['interchangeable'] {
  const parent = Uint32Array.from({ length: graph.order }, (_, v) => v)
  const rootOf = (v: number): number => {
    let root = v
    while (parent[root] !== root) root = parent[root]!
    for (let next = v; parent[next] !== root;) [next, parent[next]] = [parent[next]!, root]
    return root
  }
  let work = 0
  for (const [a, b] of likelyPairs(graph, ising)) {
    if (rootOf(a) === rootOf(b)) continue
    work += degreeOf(graph, a)
    if (work > maxWork) break
    if (canTrade(graph, ising, a, b)) parent[rootOf(a)] = rootOf(b)
  }
  const sizes = new Map<number, number>()
  for (let v = 0; v < graph.order; v++) sizes.set(rootOf(v), (sizes.get(rootOf(v)) ?? 0) + 1)
  const sets = [...sizes.values()].filter((size) => size > 1)
  return {
    sets: sets.length,
    variables: sets.reduce((sum, size) => sum + size, 0),
    largest: sets.reduce((most, size) => Math.max(most, size), 0),
  }
}

/**
 * What can be changed in any state of an Ising problem without changing its energy. Compared exactly, to the last bit:
 * rounding in the coefficients hides a symmetry. Lone variables count as free, or not at all, never as interchangeable.
 * @param graph the problem's interactions
 */
export function symmetriesOf(graph: Graph, ising: Problem, maxWork = DEFAULTS.maxWork): Symmetries {
  const { count, componentOf } = connectedComponents(graph)
  const hasField = new Uint8Array(count)
  const isJoined = new Uint8Array(count)
  let free = 0
  for (let v = 0; v < graph.order; v++) {
    if (ising.linear[v] !== 0) hasField[componentOf[v]!] = 1
    if (degreeOf(graph, v) > 0) isJoined[componentOf[v]!] = 1
    else if (ising.linear[v] === 0) free++
  }
  const mirrored = hasField.reduce((sum, field, c) => sum + Number(field === 0 && isJoined[c] === 1), 0)
  return { free, mirrored, interchangeable: interchangeable(graph, ising, maxWork) }
}
