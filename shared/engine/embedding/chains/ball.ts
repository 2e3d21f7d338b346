import type { Random } from '../../random'
import type { ChainState } from './state'

/** A set of chains around one, and all that it may change, with what they were. */
export class Ball {
  readonly members: Int32Array
  size = 0
  /** Members first, then their other partners. */
  touched: Int32Array
  touchedCount = 0
  private readonly seen: Int32Array
  private now = 0
  private readonly saved: Int32Array
  /** Scratch of the search through the machine: a chain on each qubit, and qubits in order of visit. */
  private readonly owner: Int32Array
  private readonly queue: Int32Array
  private readonly visited: Int32Array

  constructor(private readonly state: ChainState) {
    this.members = new Int32Array(state.variables)
    this.touched = new Int32Array(state.variables)
    this.seen = new Int32Array(state.variables)
    this.saved = new Int32Array(state.recordQubit.length)
    this.owner = new Int32Array(state.qubits)
    this.queue = new Int32Array(state.qubits)
    this.visited = new Int32Array(state.qubits)
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

  /** Gathers up to `most` chains that lie nearest to the centre's on the machine. */
  gatherAround(centre: number, most: number, movable: Uint8Array): void {
    const { state, members, seen, owner, queue, visited } = this
    const { head, recordQubit, recordNext, offsets, targets } = state
    const now = ++this.now
    owner.fill(-1)
    for (let v = 0; v < state.variables; v++)
      for (let record = head[v]!; record >= 0; record = recordNext[record]!) owner[recordQubit[record]!] = v
    this.size = 1
    members[0] = centre
    seen[centre] = now
    let queued = 0
    for (let record = head[centre]!; record >= 0; record = recordNext[record]!) {
      queue[queued++] = recordQubit[record]!
      visited[recordQubit[record]!] = now
    }
    for (let i = 0; i < queued && this.size < most; i++) {
      const v = owner[queue[i]!]!
      if (v >= 0 && seen[v] !== now && movable[v]) {
        seen[v] = now
        members[this.size++] = v
      }
      for (let p = offsets[queue[i]!]!; p < offsets[queue[i]! + 1]!; p++) {
        const r = targets[p]!
        if (visited[r] === now) continue
        visited[r] = now
        queue[queued++] = r
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
