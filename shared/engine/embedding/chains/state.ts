import type { Graph } from '../../graph/graph'

/** Fixed-point unit of a qubit's cost: small enough a grain for tie-breaks, large enough for exact sums in a double. */
export const COST_UNIT = 64
/** Largest cost of a qubit that is in reach; 2⁹ of them still fit a packed heap key. */
const LARGEST_COST = 2 ** 26
/** Uses of a qubit from which a further chain costs the same. */
const LARGEST_EXPONENT = 12
/** Records for memberships beyond one a qubit, as a multiple of the qubits. */
const OVERLAP_ROOM = 3

/** Neighbours among the usable qubits, as signed integers, which engines index fastest. */
function usableNeighbours(machine: Graph, usable: Uint8Array): { offsets: Int32Array; targets: Int32Array } {
  const offsets = new Int32Array(machine.order + 1)
  const targets = new Int32Array(machine.targets.length)
  let count = 0
  for (let q = 0; q < machine.order; q++) {
    for (let p = machine.offsets[q]!; usable[q] && p < machine.offsets[q + 1]!; p++)
      if (usable[machine.targets[p]!]) targets[count++] = machine.targets[p]!
    offsets[q + 1] = count
  }
  return { offsets, targets: targets.slice(0, count) }
}

/**
 * Everything a chain search works on, allocated once: chains that may overlap, costs of qubits, and the scratch of its
 * kernels. A qubit's cost is base·penalty^use, a whole number; infinite where the qubit is out of reach.
 */
export class ChainState {
  readonly qubits: number
  readonly variables: number
  /** Usable neighbours of qubit q: targets[offsets[q] … offsets[q + 1] − 1]. */
  readonly offsets: Int32Array
  readonly targets: Int32Array
  /** Interaction partners of a variable, in the same form. */
  readonly partnerOffsets: Int32Array
  readonly partners: Int32Array
  /** 32-bit words that hold one bit a partner of the variable with most. */
  readonly words: number

  /** Number of chains on a qubit, and qubits in a chain. */
  readonly use: Int32Array
  readonly length: Int32Array
  /** Chains as linked records: first record of a chain, and qubit and next record of each; −1 ends a list. */
  readonly head: Int32Array
  readonly recordQubit: Int32Array
  readonly recordNext: Int32Array
  private freeHead = 0
  freeRecords: number
  /** Σ over qubits of max(0, use − 1), and qubits with any chain. */
  overlap = 0
  qubitsUsed = 0

  /** Cost before overuse, growing with history; cost now; and the factor for each number of chains on the qubit. */
  readonly base: Float64Array
  readonly cost: Float64Array
  readonly history: Float32Array
  private readonly factor = new Float64Array(LARGEST_EXPONENT + 1)

  /** Shortest-path labels: distance (infinite unless in `labelled`) and parent, which also holds the tree. */
  readonly distance: Float64Array
  readonly parent: Int32Array
  readonly labelled: Int32Array
  /** 4-ary heap of keys distance·2¹⁷ + qubit; stale keys are skipped when they come up. */
  readonly heap: Float64Array
  /** touch[q·words + w] holds a bit for each partner whose chain is beside q, where touchedAt[q] = touchNow. */
  readonly touch: Int32Array
  readonly touchedAt: Int32Array
  touchNow = 0
  /** One bit a partner that is still to be reached. */
  readonly missing: Int32Array
  /** The tree being grown, the best so far, and its parents. */
  readonly tree: Int32Array
  treeCost = 0
  readonly bestTree: Int32Array
  readonly bestParent: Int32Array
  /** treeAt[q] = treeNow for qubits of the tree being settled, with their number of tree neighbours. */
  readonly treeAt: Int32Array
  treeNow = 0
  readonly treeDegree: Int32Array
  /** By partner number: tree qubits that touch it. */
  readonly contacts: Int32Array
  readonly saved: Int32Array

  constructor(problem: Graph, machine: Graph, usable: Uint8Array) {
    const qubits = (this.qubits = machine.order)
    const variables = (this.variables = problem.order)
    const neighbours = usableNeighbours(machine, usable)
    this.offsets = neighbours.offsets
    this.targets = neighbours.targets
    this.partnerOffsets = Int32Array.from(problem.offsets)
    this.partners = Int32Array.from(problem.targets)
    let most = 1
    for (let v = 0; v < variables; v++) most = Math.max(most, problem.offsets[v + 1]! - problem.offsets[v]!)
    this.words = (most + 31) >>> 5
    this.use = new Int32Array(qubits)
    this.length = new Int32Array(variables)
    this.head = new Int32Array(variables).fill(-1)
    this.freeRecords = (1 + OVERLAP_ROOM) * qubits + variables
    this.recordQubit = new Int32Array(this.freeRecords)
    this.recordNext = Int32Array.from({ length: this.freeRecords }, (_, i) => i + 1)
    this.base = new Float64Array(qubits).fill(COST_UNIT)
    this.cost = new Float64Array(qubits).fill(COST_UNIT)
    this.history = new Float32Array(qubits)
    this.distance = new Float64Array(qubits).fill(Infinity)
    this.parent = new Int32Array(qubits)
    this.labelled = new Int32Array(qubits)
    this.heap = new Float64Array(this.targets.length + 2 * qubits + 1)
    this.touch = new Int32Array(qubits * this.words)
    this.touchedAt = new Int32Array(qubits)
    this.missing = new Int32Array(this.words)
    this.tree = new Int32Array(qubits)
    this.bestTree = new Int32Array(qubits)
    this.bestParent = new Int32Array(qubits)
    this.treeAt = new Int32Array(qubits)
    this.treeDegree = new Int32Array(qubits)
    this.contacts = new Int32Array(most)
    this.saved = new Int32Array(qubits)
  }

  /** Forgets all chains. */
  clear(): void {
    for (let v = 0; v < this.variables; v++) this.drop(v)
  }

  partnersOf(variable: number): number {
    return this.partnerOffsets[variable + 1]! - this.partnerOffsets[variable]!
  }

  /** Sets what each further chain multiplies a qubit's cost by; infinite puts used qubits out of reach. */
  setPenalty(penalty: number): void {
    for (let use = 0; use <= LARGEST_EXPONENT; use++) this.factor[use] = use === 0 ? 1 : penalty ** use
    for (let q = 0; q < this.qubits; q++) this.setCost(q)
  }

  /** To be called for every qubit whose base or use has changed. */
  setCost(qubit: number): void {
    const use = this.use[qubit]!
    const cost = this.base[qubit]! * this.factor[use < LARGEST_EXPONENT ? use : LARGEST_EXPONENT]!
    this.cost[qubit] = cost === Infinity ? Infinity : Math.min(LARGEST_COST, Math.floor(cost))
  }

  /** Adds a qubit that is not in the chain. There must be a free record. */
  add(variable: number, qubit: number): void {
    const record = this.freeHead
    this.freeHead = this.recordNext[record]!
    this.freeRecords--
    this.recordQubit[record] = qubit
    this.recordNext[record] = this.head[variable]!
    this.head[variable] = record
    this.length[variable]!++
    this.occupy(qubit)
  }

  /** Empties a chain. */
  drop(variable: number): void {
    let record = this.head[variable]!
    this.head[variable] = -1
    while (record >= 0) {
      const next = this.recordNext[record]!
      this.vacate(this.recordQubit[record]!)
      this.recordNext[record] = this.freeHead
      this.freeHead = record
      this.freeRecords++
      record = next
    }
    this.length[variable] = 0
  }

  private occupy(qubit: number): void {
    if (this.use[qubit]!++ > 0) this.overlap++
    else this.qubitsUsed++
    this.setCost(qubit)
  }

  private vacate(qubit: number): void {
    if (--this.use[qubit]! > 0) this.overlap--
    else this.qubitsUsed--
    this.setCost(qubit)
  }

  /** Copies a chain into `target` from `at` on and returns its length. */
  copyChain(variable: number, target: Int32Array, at = 0): number {
    let count = at
    for (let record = this.head[variable]!; record >= 0; record = this.recordNext[record]!)
      target[count++] = this.recordQubit[record]!
    return count - at
  }

  owns(variable: number, qubit: number): boolean {
    for (let record = this.head[variable]!; record >= 0; record = this.recordNext[record]!)
      if (this.recordQubit[record] === qubit) return true
    return false
  }

  /** Whether a qubit of the chain is used by another chain too. */
  isConflicted(variable: number): boolean {
    for (let record = this.head[variable]!; record >= 0; record = this.recordNext[record]!)
      if (this.use[this.recordQubit[record]!]! > 1) return true
    return false
  }
}
