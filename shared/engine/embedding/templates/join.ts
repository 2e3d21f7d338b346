import type { Random } from '../../random'
import type { ChainSet } from './chain-set'
import { FREE } from './chain-set'
import { shuffle } from '../../random'

/** Joins chains that should touch by paths of free qubits; holds the scratch of its breadth-first search. */
export class Joiner {
  private readonly parent: Int32Array
  private readonly queue: Int32Array
  private readonly seen: Uint32Array
  private seenNow = 0

  constructor(private readonly set: ChainSet) {
    const { order } = set.machine
    this.parent = new Int32Array(order)
    this.queue = new Int32Array(order)
    this.seen = new Uint32Array(order)
  }

  /**
   * The last qubit of a shortest path of free qubits from the given qubits that ends beside another qubit of chain j;
   * −1 when there is none.
   */
  private pathEnd(sources: readonly number[], j: number): number {
    const { set, parent, queue, seen } = this
    const { machine, owner } = set
    const now = ++this.seenNow
    let count = 0
    for (const q of sources) {
      seen[q] = now
      queue[count++] = q
    }
    for (let k = 0; k < count; k++) {
      const q = queue[k]!
      for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
        const r = machine.targets[p]!
        if (seen[r] === now) continue
        if (owner[r] === j) return q
        if (owner[r] !== FREE) continue
        seen[r] = now
        parent[r] = q
        queue[count++] = r
      }
    }
    return -1
  }

  /** The free qubits from `end` back to where the search began. */
  private pathTo(end: number): number[] {
    const path: number[] = []
    for (let q = end; this.set.owner[q] === FREE; q = this.parent[q]!) path.push(q)
    return path
  }

  /** The part of a chain that its first qubit is in. */
  private firstPart(variable: number): number[] {
    const { set, seen } = this
    const now = ++this.seenNow
    const part = [set.chains[variable]![0]!]
    seen[part[0]!] = now
    for (const q of part)
      for (let p = set.machine.offsets[q]!; p < set.machine.offsets[q + 1]!; p++) {
        const r = set.machine.targets[p]!
        if (set.owner[r] !== variable || seen[r] === now) continue
        seen[r] = now
        part.push(r)
      }
    return part
  }

  /** Makes a chain of several parts connected; a part that no path leads to is given up. Its contacts may be lost. */
  connect(variable: number): void {
    const chain = this.set.chains[variable]!
    while (chain.length > 0) {
      const part = this.firstPart(variable)
      if (part.length === chain.length) return
      const end = this.pathEnd(part, variable)
      if (end >= 0) {
        for (const q of this.pathTo(end)) this.set.add(variable, q)
        continue
      }
      const lost = 2 * part.length >= chain.length ? chain.filter((q) => !part.includes(q)) : part
      for (const q of lost) this.set.remove(variable, q)
    }
  }

  /** Makes chains i and j touch; each gets the half of the path on its side, the shorter one the odd qubit. */
  join(i: number, j: number): boolean {
    const { set } = this
    if (set.met(i, j)) return true
    const end = this.pathEnd(set.chains[i]!, j)
    if (end < 0) return false
    const path = this.pathTo(end)
    const total = path.length + set.chains[i]!.length + set.chains[j]!.length
    const toSecond = Math.min(path.length, Math.max(0, (total >> 1) - set.chains[j]!.length))
    path.forEach((q, k) => set.add(k < toSecond ? j : i, q))
    return true
  }

  /**
   * Joins all chains that interact and do not touch yet, in random order.
   * @returns the number of interactions that stay unmet
   */
  joinAll(random: Random): number {
    const { set } = this
    const unmet = Int32Array.from(set.unmet())
    shuffle(unmet, random)
    let failures = 0
    for (const k of unmet) if (!this.join(set.problem.ends[2 * k]!, set.problem.ends[2 * k + 1]!)) failures++
    return failures
  }
}
