import type { Random } from '../../random'
import type { ChainState } from './state'

/**
 * A set of chains that are renegotiated together while all others are out of reach, with what they were before. Keeps
 * the fence around all chains of the state up to date, and which chain has which qubit, so that a ball costs no more
 * than its chains do.
 */
export class Ball {
  private readonly members: Int32Array
  private size = 0
  /** Members first, then their other partners: all that a renegotiation may change. */
  private readonly touched: Int32Array
  private touchedCount = 0
  /** Chains as they were: length, then qubits, one after the other. */
  private readonly saved: Int32Array
  private readonly owner: Int32Array
  private readonly queue: Int32Array
  /** Numbers of the last ball that saw a variable, and a qubit. */
  private readonly seen: Int32Array
  private readonly visited: Int32Array
  private now = 0

  /** Fences all chains of a state without overlap. */
  constructor(
    private readonly state: ChainState,
    private readonly movable: Uint8Array,
  ) {
    this.members = new Int32Array(state.variables)
    this.touched = new Int32Array(state.variables)
    this.saved = new Int32Array(state.recordQubit.length)
    this.owner = new Int32Array(state.qubits).fill(-1)
    this.queue = new Int32Array(state.qubits)
    this.seen = new Int32Array(state.variables)
    this.visited = new Int32Array(state.qubits)
    for (let v = 0; v < state.variables; v++) this.close(v)
  }

  /** The members, in an order that may be changed. */
  get order(): Int32Array {
    return this.members.subarray(0, this.size)
  }

  /** Gathers up to `most` chains breadth first over partners, each one's from a random one on. */
  gatherPartners(centre: number, most: number, random: Random): void {
    const { state, members } = this
    this.begin(centre)
    for (let i = 0; i < this.size && this.size < most; i++) {
      const first = state.partnerOffsets[members[i]!]!
      const count = state.partnersOf(members[i]!)
      const from = count > 0 ? random.below(count) : 0
      for (let j = 0; j < count && this.size < most; j++) this.take(state.partners[first + ((from + j) % count)]!)
    }
    this.open()
  }

  /** Gathers up to `most` chains that lie nearest to the centre's on the machine. */
  gatherAround(centre: number, most: number): void {
    const { state, owner, queue, visited } = this
    const { head, recordQubit, recordNext, offsets, targets } = state
    this.begin(centre)
    const { now } = this
    let queued = 0
    for (let record = head[centre]!; record >= 0; record = recordNext[record]!) {
      queue[queued++] = recordQubit[record]!
      visited[recordQubit[record]!] = now
    }
    for (let i = 0; i < queued && this.size < most; i++) {
      if (owner[queue[i]!]! >= 0) this.take(owner[queue[i]!]!)
      for (let p = offsets[queue[i]!]!; p < offsets[queue[i]! + 1]!; p++) {
        const r = targets[p]!
        if (visited[r] === now) continue
        visited[r] = now
        queue[queued++] = r
      }
    }
    this.open()
  }

  private begin(centre: number): void {
    this.now++
    this.size = 0
    this.take(centre)
  }

  private take(variable: number): void {
    if (this.seen[variable] === this.now || !this.movable[variable]) return
    this.seen[variable] = this.now
    this.members[this.size++] = variable
  }

  /** Saves all that may change and takes the members out of the fence. */
  private open(): void {
    const { state, members, touched, seen, now } = this
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
    let at = 0
    for (let i = 0; i < this.touchedCount; i++) {
      this.saved[at] = state.copyChain(touched[i]!, this.saved, at + 1)
      at += this.saved[at]! + 1
    }
    for (let i = 0; i < this.size; i++) this.setFence(members[i]!, 0)
  }

  private setFence(variable: number, closed: 0 | 1): void {
    const { state } = this
    for (let record = state.head[variable]!; record >= 0; record = state.recordNext[record]!) {
      const q = state.recordQubit[record]!
      state.fenced[q] = closed
      state.setCost(q)
    }
  }

  private close(variable: number): void {
    const { state, owner } = this
    this.setFence(variable, 1)
    for (let record = state.head[variable]!; record >= 0; record = state.recordNext[record]!)
      owner[state.recordQubit[record]!] = variable
  }

  /** Sets the cost of sharing qubits among the members. */
  setPenalty(penalty: number): void {
    this.state.setPenaltyOf(this.touched, this.touchedCount, penalty)
  }

  /** Σ length^exponent of all that may change. */
  burden(exponent: number): number {
    let sum = 0
    for (let i = 0; i < this.touchedCount; i++) sum += this.state.length[this.touched[i]!]! ** exponent
    return sum
  }

  /** Puts the fence around the chains as they are now, or as they were before. */
  end(keep: boolean): void {
    const { state, saved, touched, owner } = this
    let at = 0
    for (let i = 0; i < this.touchedCount; i++) {
      const length = saved[at]!
      if (!keep) state.drop(touched[i]!)
      for (let j = 1; j <= length; j++) {
        const q = saved[at + j]!
        owner[q] = -1
        state.fenced[q] = 0
        state.setCost(q)
      }
      at += length + 1
    }
    at = 0
    for (let i = 0; i < this.touchedCount; i++) {
      const length = saved[at]!
      for (let j = length; !keep && j >= 1; j--) state.add(touched[i]!, saved[at + j]!)
      at += length + 1
    }
    for (let i = 0; i < this.touchedCount; i++) this.close(touched[i]!)
  }
}
