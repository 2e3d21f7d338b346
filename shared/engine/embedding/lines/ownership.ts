import { packChains } from '../embedding'
import type { Embedding } from '../embedding'

/** Owner of a qubit that no chain has. */
export const FREE = -1

/** Chains that share no qubit: each qubit has one owner, and a doubly linked list joins the qubits of an owner. */
export class Ownership {
  /** By qubit: the variable whose chain it is in, −1 when free, −2 when it does not work. */
  readonly owner: Int32Array
  /** By variable: number of qubits, and the first of the list or −1. */
  readonly length: Int32Array
  readonly head: Int32Array
  /** By qubit: the next of the list or −1. */
  readonly next: Int32Array
  private readonly previous: Int32Array

  constructor(
    variables: number,
    private readonly usable: Uint8Array,
  ) {
    this.owner = new Int32Array(usable.length)
    this.length = new Int32Array(variables)
    this.head = new Int32Array(variables)
    this.next = new Int32Array(usable.length)
    this.previous = new Int32Array(usable.length)
    this.clear()
  }

  clear(): void {
    const { owner, usable } = this
    for (let q = 0; q < owner.length; q++) owner[q] = usable[q] === 1 ? FREE : -2
    this.length.fill(0)
    this.head.fill(-1)
  }

  /** Adds a free qubit to a chain. */
  give(q: number, v: number): void {
    const first = this.head[v]!
    this.owner[q] = v
    this.next[q] = first
    this.previous[q] = -1
    if (first >= 0) this.previous[first] = q
    this.head[v] = q
    this.length[v]!++
  }

  /** Frees a qubit of a chain. */
  take(q: number): void {
    const v = this.owner[q]!
    const before = this.previous[q]!
    const after = this.next[q]!
    if (before < 0) this.head[v] = after
    else this.next[before] = after
    if (after >= 0) this.previous[after] = before
    this.owner[q] = FREE
    this.length[v]!--
  }

  toEmbedding(): Embedding {
    return packChains(
      Array.from(this.head, (first) => {
        const chain: number[] = []
        for (let q = first; q >= 0; q = this.next[q]!) chain.push(q)
        return chain
      }),
    )
  }
}
