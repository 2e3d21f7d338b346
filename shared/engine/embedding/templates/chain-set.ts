import type { Graph } from '../../graph/graph'
import { packChains } from '../embedding'
import type { Embedding } from '../embedding'

/** Owner of a qubit that no chain has, and of one that none may have. */
export const FREE = -1
export const UNUSABLE = -2

/** Disjoint chains that grow and shrink, with the couplers between each two of them counted at every step. */
export class ChainSet {
  readonly owner: Int32Array
  readonly chains: number[][]
  /** contacts[i·order + j] couplers join chains i and j. */
  readonly contacts: Uint16Array
  /** 1 at i·order + j where variables i and j interact. */
  readonly interacts: Uint8Array
  private readonly tally: Int32Array
  private readonly touched: Int32Array
  private readonly mark: Uint32Array
  private readonly queue: Int32Array
  private markNow = 0

  constructor(
    readonly problem: Graph,
    readonly machine: Graph,
    usable: Uint8Array,
  ) {
    const n = problem.order
    this.owner = Int32Array.from(usable, (works) => (works ? FREE : UNUSABLE))
    this.chains = Array.from({ length: n }, () => [])
    this.contacts = new Uint16Array(n * n)
    this.interacts = new Uint8Array(n * n)
    for (let k = 0; k < problem.ends.length; k += 2) {
      const [i, j] = [problem.ends[k]!, problem.ends[k + 1]!]
      this.interacts[i * n + j] = this.interacts[j * n + i] = 1
    }
    this.tally = new Int32Array(n)
    this.touched = new Int32Array(n)
    this.mark = new Uint32Array(machine.order)
    this.queue = new Int32Array(machine.order)
  }

  private countContacts(variable: number, qubit: number, step: 1 | -1): void {
    const { machine, owner, contacts, problem } = this
    for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
      const other = owner[machine.targets[p]!]!
      if (other < 0 || other === variable) continue
      contacts[variable * problem.order + other]! += step
      contacts[other * problem.order + variable]! += step
    }
  }

  /** Gives a free qubit to a chain. */
  add(variable: number, qubit: number): void {
    this.owner[qubit] = variable
    this.chains[variable]!.push(qubit)
    this.countContacts(variable, qubit, 1)
  }

  /** Frees a qubit of a chain. */
  remove(variable: number, qubit: number): void {
    const chain = this.chains[variable]!
    const last = chain.pop()!
    if (last !== qubit) chain[chain.indexOf(qubit)] = last
    this.countContacts(variable, qubit, -1)
    this.owner[qubit] = FREE
  }

  met(i: number, j: number): boolean {
    return this.contacts[i * this.problem.order + j]! > 0
  }

  /** Edge numbers of the interactions that no coupler carries. */
  unmet(): number[] {
    const { ends } = this.problem
    const unmet: number[] = []
    for (let k = 0; 2 * k < ends.length; k++) if (!this.met(ends[2 * k]!, ends[2 * k + 1]!)) unmet.push(k)
    return unmet
  }

  /** Whether every interaction that the qubit's chain has at present stays without this qubit. */
  isSpare(qubit: number): boolean {
    const { machine, owner, contacts, interacts, tally, touched } = this
    const n = this.problem.order
    const row = owner[qubit]! * n
    let distinct = 0
    for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
      const other = owner[machine.targets[p]!]!
      if (other < 0 || interacts[row + other] === 0) continue
      if (tally[other]!++ === 0) touched[distinct++] = other
    }
    let spare = true
    for (let i = 0; i < distinct; i++) {
      const other = touched[i]!
      if (tally[other] === contacts[row + other]) spare = false
      tally[other] = 0
    }
    return spare
  }

  /** How many qubits of the chain the first one reaches through the others, when `without` is left out. */
  private reached(chain: readonly number[], without: number): number {
    const { machine, owner, mark, queue } = this
    const now = ++this.markNow
    const start = chain[0] === without ? chain[1]! : chain[0]!
    const variable = owner[start]!
    mark[start] = mark[without] = now
    queue[0] = start
    let count = 1
    for (let i = 0; i < count; i++) {
      const q = queue[i]!
      for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
        const r = machine.targets[p]!
        if (owner[r] !== variable || mark[r] === now) continue
        mark[r] = now
        queue[count++] = r
      }
    }
    return count
  }

  /** Whether the chain of this qubit, of two qubits or more, stays connected without it. */
  isRemovable(qubit: number): boolean {
    const chain = this.chains[this.owner[qubit]!]!
    return this.reached(chain, qubit) === chain.length - 1
  }

  pack(): Embedding {
    return packChains(this.chains)
  }

  clear(): void {
    for (let i = 0; i < this.chains.length; i++) {
      for (const q of this.chains[i]!) this.owner[q] = FREE
      this.chains[i]!.length = 0
    }
    this.contacts.fill(0)
  }

  /** Takes over chains that were copied from `chains` before. */
  restore(chains: readonly (readonly number[])[]): void {
    this.clear()
    chains.forEach((chain, i) => chain.forEach((q) => this.add(i, q)))
  }

  copy(): number[][] {
    return this.chains.map((chain) => [...chain])
  }
}
