/**
 * Which qubits belong to which chains while chains may still overlap. One record a membership, linked twice: along
 * its chain and along the owners of its qubit. Kept incrementally: how many chains use a qubit, how long each chain
 * is, and the total overlap Σ_q max(0, use_q − 1).
 */
export class Memberships {
  /** Number of chains on a qubit. */
  readonly use: Uint16Array
  /** Number of qubits of a chain. */
  readonly length: Int32Array
  /** First record of a chain and of a qubit, or −1. */
  readonly chainHead: Int32Array
  readonly ownerHead: Int32Array
  /** Fields of a record. */
  variable: Int32Array
  qubit: Int32Array
  chainNext: Int32Array
  ownerNext: Int32Array
  overlap = 0
  qubitsUsed = 0
  private freeHead = -1

  constructor(variables: number, qubits: number) {
    this.use = new Uint16Array(qubits)
    this.length = new Int32Array(variables)
    this.chainHead = new Int32Array(variables).fill(-1)
    this.ownerHead = new Int32Array(qubits).fill(-1)
    this.variable = new Int32Array(0)
    this.qubit = new Int32Array(0)
    this.chainNext = new Int32Array(0)
    this.ownerNext = new Int32Array(0)
    this.extend(2 * qubits + variables + 1)
  }

  /** Chains overlap only while they are negotiated, so the first capacity nearly always lasts. */
  private extend(capacity: number): void {
    const from = this.variable.length
    const grown = (old: Int32Array): Int32Array => {
      const larger = new Int32Array(capacity)
      larger.set(old)
      return larger
    }
    this.variable = grown(this.variable)
    this.qubit = grown(this.qubit)
    this.chainNext = grown(this.chainNext)
    this.ownerNext = grown(this.ownerNext)
    for (let record = from; record < capacity; record++) this.release(record)
  }

  private release(record: number): void {
    this.chainNext[record] = this.freeHead
    this.freeHead = record
  }

  owns(variable: number, qubit: number): boolean {
    for (let record = this.ownerHead[qubit]!; record >= 0; record = this.ownerNext[record]!)
      if (this.variable[record] === variable) return true
    return false
  }

  /** Adds a qubit that is not yet in the chain. */
  add(variable: number, qubit: number): void {
    if (this.freeHead < 0) this.extend(2 * this.variable.length)
    const record = this.freeHead
    this.freeHead = this.chainNext[record]!
    this.variable[record] = variable
    this.qubit[record] = qubit
    this.chainNext[record] = this.chainHead[variable]!
    this.chainHead[variable] = record
    this.ownerNext[record] = this.ownerHead[qubit]!
    this.ownerHead[qubit] = record
    this.length[variable]!++
    if (this.use[qubit]!++ > 0) this.overlap++
    else this.qubitsUsed++
  }

  /** Removes a qubit from a chain that has it. */
  remove(variable: number, qubit: number): void {
    let previous = -1
    let record = this.chainHead[variable]!
    while (this.qubit[record] !== qubit) {
      previous = record
      record = this.chainNext[record]!
    }
    const next = this.chainNext[record]!
    if (previous < 0) this.chainHead[variable] = next
    else this.chainNext[previous] = next
    this.detach(record)
  }

  /** Empties a chain. */
  drop(variable: number): void {
    let record = this.chainHead[variable]!
    this.chainHead[variable] = -1
    while (record >= 0) {
      const next = this.chainNext[record]!
      this.detach(record)
      record = next
    }
  }

  /** Copies a chain into `target` and returns its length. */
  copyChain(variable: number, target: Int32Array): number {
    let count = 0
    for (let record = this.chainHead[variable]!; record >= 0; record = this.chainNext[record]!)
      target[count++] = this.qubit[record]!
    return count
  }

  /** Whether a qubit of the chain is used by another chain too. */
  isConflicted(variable: number): boolean {
    for (let record = this.chainHead[variable]!; record >= 0; record = this.chainNext[record]!)
      if (this.use[this.qubit[record]!]! > 1) return true
    return false
  }

  private detach(record: number): void {
    const qubit = this.qubit[record]!
    let previous = -1
    let at = this.ownerHead[qubit]!
    while (at !== record) {
      previous = at
      at = this.ownerNext[at]!
    }
    if (previous < 0) this.ownerHead[qubit] = this.ownerNext[record]!
    else this.ownerNext[previous] = this.ownerNext[record]!
    this.length[this.variable[record]!]!--
    if (--this.use[qubit]! > 0) this.overlap--
    else this.qubitsUsed--
    this.release(record)
  }
}
