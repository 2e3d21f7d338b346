import type { Graph } from '../graph/graph'
import { degreeOf } from '../graph/graph'
import type { Random } from '../random'
import { connectedParts } from './parts'
import type { SearchState } from './state'

/** Shuffles the first `count` items in place (Fisher & Yates). */
export function shuffle(items: Int32Array, count: number, random: Random): void {
  for (let i = count - 1; i > 0; i--) {
    const j = random.below(i + 1)
    const moved = items[i]!
    items[i] = items[j]!
    items[j] = moved
  }
}

/**
 * Variables that have interactions, breadth first from a random one in each connected part of the problem, so that
 * each but the first of a part has a neighbour before it.
 */
export function placingOrder(problem: Graph, random: Random): Int32Array {
  const starts = Int32Array.from({ length: problem.order }, (_, v) => v)
  shuffle(starts, starts.length, random)
  const order = new Int32Array(problem.order)
  const queued = new Uint8Array(problem.order)
  let count = 0
  for (const start of starts) {
    if (queued[start] || degreeOf(problem, start) === 0) continue
    let next = count
    order[count++] = start
    queued[start] = 1
    while (next < count) {
      const v = order[next++]!
      const first = count
      for (let p = problem.offsets[v]!; p < problem.offsets[v + 1]!; p++) {
        const u = problem.targets[p]!
        if (queued[u]) continue
        queued[u] = 1
        order[count++] = u
      }
      shuffle(order.subarray(first, count), count - first, random)
    }
  }
  return order.subarray(0, count)
}

/**
 * Chooses for each connected part of the problem one of the machine's, largest first and at random in proportion to
 * the room left in those that can take it (the one with most room when none can). Returns the machine part by
 * problem part; −1 where the machine has no qubit.
 */
function assignParts(needs: readonly number[], rooms: readonly number[], random: Random): Int32Array {
  const left = [...rooms]
  const chosen = new Int32Array(needs.length).fill(-1)
  const bySize = needs.map((_, i) => i).sort((a, b) => needs[b]! - needs[a]! || a - b)
  for (const i of bySize) {
    const fitting = left.reduce((sum, room) => sum + (room >= needs[i]! ? room : 0), 0)
    let ticket = fitting > 0 ? random.below(fitting) : -1
    let pick = left.indexOf(Math.max(...left))
    for (let part = 0; part < left.length && ticket >= 0; part++) {
      if (left[part]! < needs[i]!) continue
      pick = part
      ticket -= left[part]!
    }
    chosen[i] = pick
    if (pick >= 0) left[pick]! -= needs[i]!
  }
  return chosen
}

/** Finds first qubits for variables without placed neighbours, so that connected sets get room of their own. */
export class Seeder {
  private readonly problemPart: Int32Array
  private readonly machinePart: Int32Array
  private readonly candidates: Int32Array[]
  private readonly chosen: Int32Array

  constructor(
    private readonly state: SearchState,
    private readonly random: Random,
  ) {
    const problemParts = connectedParts(state.problem)
    const machineParts = connectedParts(state.machine, state.usable)
    this.problemPart = problemParts.partOf
    this.machinePart = machineParts.partOf
    this.chosen = assignParts(problemParts.sizes, machineParts.sizes, random)
    const next = new Int32Array(machineParts.sizes.length)
    this.candidates = machineParts.sizes.map((size) => new Int32Array(size))
    for (let q = 0; q < state.machine.order; q++) {
      const part = this.machinePart[q]!
      if (part >= 0) this.candidates[part]![next[part]!++] = q
    }
  }

  /** A random qubit in the machine part chosen for the variable, free if a few draws or a scan find one; −1 if none. */
  pick(variable: number): number {
    const candidates = this.candidates[this.chosen[this.problemPart[variable]!]!]
    if (!candidates) return -1
    const from = this.random.below(candidates.length)
    for (let i = 0; i < candidates.length; i++) {
      const q = candidates[(from + i) % candidates.length]!
      if (this.state.chains.use[q] === 0) return q
    }
    return candidates[from]!
  }
}
