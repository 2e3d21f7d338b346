import type { Graph } from '../../graph/graph'
import { FREE } from './ownership'
import type { Ownership } from './ownership'

/** Trims disjoint chains and joins those that ought to touch and do not. Chains stay connected throughout. */
export class Mender {
  /** By variable: mark of the partners of the one under inspection, couplers to them, and those of one qubit. */
  private readonly partnerMark: Uint32Array
  private partnerNow = 0
  private readonly contacts: Int32Array
  private readonly tally: Int32Array
  /** By qubit: order of visit, the qubit before, and mark, of a breadth-first search. */
  private readonly queue: Int32Array
  private readonly before: Int32Array
  private readonly seen: Uint32Array
  private seenNow = 0

  constructor(
    private readonly problem: Graph,
    private readonly machine: Graph,
    private readonly chains: Ownership,
  ) {
    this.partnerMark = new Uint32Array(problem.order)
    this.contacts = new Int32Array(problem.order)
    this.tally = new Int32Array(problem.order)
    this.queue = new Int32Array(machine.order)
    this.before = new Int32Array(machine.order)
    this.seen = new Uint32Array(machine.order)
  }

  /** Adds `sign` to the count of each partner for every coupler from a qubit to its chain. */
  private count(q: number, counts: Int32Array, sign: 1 | -1): void {
    const { machine, chains, partnerMark, partnerNow } = this
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const u = chains.owner[machine.targets[p]!]!
      if (u >= 0 && partnerMark[u] === partnerNow) counts[u]! += sign
    }
  }

  /** Counts the couplers from the chain of v to those of its partners. */
  private inspect(v: number): void {
    const { problem, chains, partnerMark, contacts } = this
    const now = ++this.partnerNow
    for (let p = problem.offsets[v]!; p < problem.offsets[v + 1]!; p++) {
      partnerMark[problem.targets[p]!] = now
      contacts[problem.targets[p]!] = 0
    }
    for (let q = chains.head[v]!; q >= 0; q = chains.next[q]!) this.count(q, contacts, 1)
  }

  /** Whether some partner is touched through this qubit of the chain under inspection only. */
  private isNeeded(q: number): boolean {
    const { machine, chains, partnerMark, partnerNow, contacts, tally } = this
    this.count(q, tally, 1)
    let needed = false
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const u = chains.owner[machine.targets[p]!]!
      if (u < 0 || partnerMark[u] !== partnerNow) continue
      if (tally[u] === contacts[u]) needed = true
    }
    this.count(q, tally, -1)
    return needed
  }

  /** The one qubit of the same chain beside q, −1 when there are several (or none). */
  private onlyFellow(q: number): number {
    const { machine, chains } = this
    let fellow = -1
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      if (chains.owner[machine.targets[p]!] !== chains.owner[q]) continue
      if (fellow >= 0) return -1
      fellow = machine.targets[p]!
    }
    return fellow
  }

  /** Takes away loose ends that no partner needs. */
  trim(v: number): void {
    const { chains, queue } = this
    this.inspect(v)
    let count = 0
    for (let q = chains.head[v]!; q >= 0; q = chains.next[q]!) queue[count++] = q
    for (let i = 0; i < count; i++) {
      let q = queue[i]!
      while (chains.owner[q] === v && chains.length[v]! > 1) {
        const fellow = this.onlyFellow(q)
        if (fellow < 0 || this.isNeeded(q)) break
        this.count(q, this.contacts, -1)
        chains.take(q)
        q = fellow
      }
    }
  }

  /** Interactions without a coupler between the two chains, as edge numbers, ascending. */
  unmet(): number[] {
    const { problem, contacts } = this
    const unmet: number[] = []
    for (let v = 0; v < problem.order; v++) {
      this.inspect(v)
      for (let p = problem.offsets[v]!; p < problem.offsets[v + 1]!; p++)
        if (problem.targets[p]! > v && contacts[problem.targets[p]!] === 0) unmet.push(problem.edgeIds[p]!)
    }
    return unmet
  }

  /**
   * Joins the chains of u and v by a shortest way through free qubits; each gets half of it. Returns whether there is
   * one.
   */
  connect(u: number, v: number): boolean {
    const { machine, chains, queue, before, seen } = this
    const { owner } = chains
    const now = ++this.seenNow
    let count = 0
    for (let q = chains.head[u]!; q >= 0; q = chains.next[q]!) {
      queue[count++] = q
      before[q] = -1
      seen[q] = now
    }
    for (let i = 0; i < count; i++) {
      const q = queue[i]!
      for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
        const r = machine.targets[p]!
        if (owner[r] === v) {
          this.shareWay(q, u, v)
          return true
        }
        if (owner[r] !== FREE || seen[r] === now) continue
        seen[r] = now
        before[r] = q
        queue[count++] = r
      }
    }
    return false
  }

  /** The way from the chain of u to the last free qubit before that of v: the outer half for v, the rest for u. */
  private shareWay(last: number, u: number, v: number): void {
    const { chains, before } = this
    let free = 0
    for (let q = last; before[q]! >= 0; q = before[q]!) free++
    let forV = free >> 1
    for (let q = last; before[q]! >= 0; q = before[q]!) chains.give(q, forV-- > 0 ? v : u)
  }
}
