import type { Random } from '../../random'
import type { ChainSet } from './chain-set'
import { FREE } from './chain-set'

const DEFAULTS = {
  /** Free qubits that a chain is grown from, of which the best is kept. */
  starts: 24,
}

/** Grows chains through what the others leave free; holds the scratch of its breadth-first searches. */
export class ExtraGrower {
  private readonly parent: Int32Array
  private readonly queue: Int32Array
  private readonly seen: Uint32Array
  private seenNow = 0
  private readonly met: Uint32Array
  private metNow = 0

  constructor(private readonly set: ChainSet) {
    const { order } = set.machine
    this.parent = new Int32Array(order)
    this.queue = new Int32Array(order)
    this.seen = new Uint32Array(order)
    this.met = new Uint32Array(set.problem.order)
  }

  /** How many partners the qubit would meet for the first time; a partner may count twice. */
  private gain(variable: number, qubit: number): number {
    const { machine, owner, interacts, problem } = this.set
    let count = 0
    for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
      const other = owner[machine.targets[p]!]!
      if (other < 0 || this.met[other] === this.metNow) continue
      count += interacts[variable * problem.order + other]!
    }
    return count
  }

  private take(variable: number, qubit: number): void {
    const { set } = this
    set.add(variable, qubit)
    for (let p = set.machine.offsets[qubit]!; p < set.machine.offsets[qubit + 1]!; p++) {
      const other = set.owner[set.machine.targets[p]!]!
      if (other >= 0) this.met[other] = this.metNow
    }
  }

  /** Of the free qubits nearest to the chain that meet someone new, the one that meets most; −1 when there is none. */
  private bestNearest(variable: number): number {
    const { set, parent, queue, seen } = this
    const { machine, owner } = set
    const now = ++this.seenNow
    let count = 0
    for (const q of set.chains[variable]!) {
      seen[q] = now
      queue[count++] = q
    }
    let [best, bestGain, ring] = [-1, 0, count]
    for (let k = 0; k < count; k++) {
      if (k === ring) {
        if (best >= 0) return best
        ring = count
      }
      for (let p = machine.offsets[queue[k]!]!; p < machine.offsets[queue[k]! + 1]!; p++) {
        const r = machine.targets[p]!
        if (owner[r] !== FREE || seen[r] === now) continue
        seen[r] = now
        parent[r] = queue[k]!
        queue[count++] = r
        const gain = this.gain(variable, r)
        if (gain > bestGain) [best, bestGain] = [r, gain]
      }
    }
    return best
  }

  private growFrom(variable: number, start: number): void {
    this.metNow++
    this.take(variable, start)
    for (let end = this.bestNearest(variable); end >= 0; end = this.bestNearest(variable))
      for (let q = end; this.set.owner[q] === FREE; q = this.parent[q]!) this.take(variable, q)
  }

  private missing(variable: number): number {
    const { problem } = this.set
    let count = 0
    for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++) {
      const other = problem.targets[p]!
      if (this.set.chains[other]!.length > 0 && !this.set.met(variable, other)) count++
    }
    return count
  }

  /**
   * Gives a variable without a chain one of free qubits that meets as many of its partners as can be reached, greedily:
   * always on to the nearest qubit that meets someone new. Of several starts the one that misses fewest partners is
   * kept, then the shortest.
   */
  grow(variable: number, random: Random): void {
    const { set } = this
    const free = Array.from(set.owner.keys()).filter((q) => set.owner[q] === FREE)
    let best: number[] = []
    let bestMissing = Infinity
    for (let k = 0; k < DEFAULTS.starts && free.length > 0; k++) {
      this.growFrom(variable, free[random.below(free.length)]!)
      const chain = [...set.chains[variable]!]
      const missing = this.missing(variable)
      for (const q of chain) set.remove(variable, q)
      if (missing > bestMissing || (missing === bestMissing && chain.length >= best.length)) continue
      best = chain
      bestMissing = missing
    }
    for (const q of best) set.add(variable, q)
  }
}
