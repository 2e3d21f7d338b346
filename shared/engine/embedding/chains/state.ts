import type { KernelChoice } from '../../assembly'
import type { Graph } from '../../graph/graph'
import { COST_UNIT, FAR } from './costs'
import { growTree } from './grow'
import { allocate } from './kernel'
import type { Arrays } from './kernel'

/** Entries of the table that tells the kernel sizes and addresses. */
const TABLE_LENGTH = 18

/** Largest cost of a qubit that is in reach; ways of up to 2¹¹ of them are told apart. */
const LARGEST_COST = 2 ** 19
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
  readonly nodes: Int32Array
  readonly history: Float32Array
  private readonly factor = new Float64Array(LARGEST_EXPONENT + 1)

  /** 1 for qubits that are out of reach whatever they cost, and for chains that take no gifts. */
  readonly fenced: Uint8Array
  readonly frozen: Uint8Array

  /** Shortest-path labels: distance (infinite unless in `labelled`) and parent, which also holds the tree. */
  readonly parent: Int32Array
  readonly labelled: Int32Array
  /** 4-ary heap of keys distance·2¹⁷ + qubit; stale keys are skipped when they come up. */
  readonly heap: Float64Array
  /** Keys from which stale ones are dropped: there is room for a tree beyond. */
  readonly heapRoom: number
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

  /** Cost of the last tree grown, by the kernel. */
  private readonly result: Int32Array
  private readonly kernel: Arrays<string, string>['kernel']

  constructor(problem: Graph, machine: Graph, usable: Uint8Array, kernel: KernelChoice) {
    const qubits = (this.qubits = machine.order)
    const variables = (this.variables = problem.order)
    const neighbours = usableNeighbours(machine, usable)
    let most = 1
    for (let v = 0; v < variables; v++) most = Math.max(most, problem.offsets[v + 1]! - problem.offsets[v]!)
    const words = (this.words = (most + 31) >>> 5)
    const records = (this.freeRecords = (1 + OVERLAP_ROOM) * qubits + variables)
    const arrays = allocate(
      kernel,
      {
        offsets: qubits + 1,
        targets: neighbours.targets.length,
        partnerOffsets: variables + 1,
        partners: problem.targets.length,
        head: variables,
        recordQubit: records,
        recordNext: records,
        nodes: 2 * qubits,
        parent: qubits,
        labelled: qubits,
        touch: qubits * words,
        touchedAt: qubits,
        missing: words,
        tree: qubits,
        result: 1,
        table: TABLE_LENGTH,
      },
      { heap: neighbours.targets.length + 2 * qubits + 1 },
    )
    this.kernel = arrays.kernel
    ;({
      offsets: this.offsets,
      targets: this.targets,
      partnerOffsets: this.partnerOffsets,
      partners: this.partners,
      head: this.head,
      recordQubit: this.recordQubit,
      recordNext: this.recordNext,
      nodes: this.nodes,
      parent: this.parent,
      labelled: this.labelled,
      touch: this.touch,
      touchedAt: this.touchedAt,
      missing: this.missing,
      tree: this.tree,
      result: this.result,
    } = arrays.ints)
    ;({ heap: this.heap } = arrays.floats)
    this.heapRoom = this.heap.length - qubits
    this.offsets.set(neighbours.offsets)
    this.targets.set(neighbours.targets)
    this.partnerOffsets.set(problem.offsets)
    this.partners.set(problem.targets)
    this.head.fill(-1)
    for (let i = 0; i < records; i++) this.recordNext[i] = i + 1
    for (let q = 0; q < qubits; q++) this.nodes.set([COST_UNIT, FAR], 2 * q)
    this.use = new Int32Array(qubits)
    this.length = new Int32Array(variables)
    this.base = new Float64Array(qubits).fill(COST_UNIT)
    this.fenced = new Uint8Array(qubits)
    this.frozen = new Uint8Array(variables)
    this.history = new Float32Array(qubits)
    this.bestTree = new Int32Array(qubits)
    this.bestParent = new Int32Array(qubits)
    this.treeAt = new Int32Array(qubits)
    this.treeDegree = new Int32Array(qubits)
    this.contacts = new Int32Array(most)
    this.saved = new Int32Array(qubits)
    this.bind(arrays.ints.table)
  }

  /** Tells the kernel where its arrays are: the table that `bind` of kernels/growth.as reads. */
  private bind(table: Int32Array): void {
    if (!this.kernel) return
    const { offsets, targets, partnerOffsets, partners, head, recordQubit, recordNext } = this
    const { nodes, parent, labelled, heap, touch, touchedAt, missing, tree, result } = this
    const growth = [
      ...[offsets, targets, partnerOffsets, partners, head, recordQubit, recordNext, nodes],
      ...[parent, labelled, heap, touch, touchedAt, missing, tree, result],
    ]
    table.set([this.words, this.heapRoom, ...growth.map(({ byteOffset }) => byteOffset)])
    this.kernel.bind(table.byteOffset)
  }

  /** `growTree` by the kernel where there is one. */
  grow(variable: number, start: number, placed: number, ceiling: number): number {
    if (!this.kernel) return growTree(this, variable, start, placed, ceiling)
    const size = this.kernel.grow(variable, start, placed, ceiling, this.touchNow)
    this.treeCost = this.result[0]!
    return size
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
    this.setFactors(penalty)
    for (let q = 0; q < this.qubits; q++) this.setCost(q)
  }

  /** As `setPenalty`, but only the qubits of the given chains get their new cost now. */
  setPenaltyOf(chains: Int32Array, count: number, penalty: number): void {
    this.setFactors(penalty)
    for (let i = 0; i < count; i++)
      for (let record = this.head[chains[i]!]!; record >= 0; record = this.recordNext[record]!)
        this.setCost(this.recordQubit[record]!)
  }

  private setFactors(penalty: number): void {
    for (let use = 0; use <= LARGEST_EXPONENT; use++) this.factor[use] = use === 0 ? 1 : penalty ** use
  }

  /** To be called for every qubit whose base, fence or use has changed. */
  setCost(qubit: number): void {
    const use = this.use[qubit]!
    const cost = this.base[qubit]! * this.factor[use < LARGEST_EXPONENT ? use : LARGEST_EXPONENT]!
    const closed = this.fenced[qubit] === 1 || cost === Infinity
    this.nodes[2 * qubit] = closed ? FAR : Math.min(LARGEST_COST, Math.floor(cost))
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
