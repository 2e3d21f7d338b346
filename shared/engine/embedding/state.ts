import type { Graph } from '../graph/graph'
import { IndexedHeap } from './heap'
import { Memberships } from './memberships'

/** Exponent of the overuse penalty from which further chains on a qubit cost the same; keeps weights finite. */
const LARGEST_EXPONENT = 8

/**
 * Everything a search works on, allocated once: chains, qubit weights, and the scratch arrays of its kernels.
 * The weight of a qubit is base·penalty^use; in strict mode a used qubit is out of reach.
 */
export class SearchState {
  readonly chains: Memberships
  /** (1 + history) with a small random part that breaks ties; infinite where the qubit does not work. */
  readonly base: Float64Array
  readonly history: Float32Array
  /** penaltyOf[use] is the factor for a qubit that `use` chains have already. */
  readonly penaltyOf = new Float64Array(65536)
  /** Shortest-path labels, valid where `stamp` equals the current growth's number. */
  readonly distance: Float64Array
  readonly parent: Int32Array
  readonly stamp: Uint32Array
  stampNow = 0
  readonly heap: IndexedHeap
  /** Qubits of the tree being grown, of the best tree so far, and a saved chain. */
  readonly tree: Int32Array
  treeSize = 0
  readonly bestTree: Int32Array
  readonly saved: Int32Array
  /** wanted[u] equals wantedNow while neighbour u is not yet reached. */
  readonly wanted: Uint32Array
  wantedNow = 0
  /** Breadth-first tree of one chain: order of visit, and by qubit the parent, number of tree neighbours and mark. */
  readonly visit: Int32Array
  readonly up: Int32Array
  readonly treeDegree: Int32Array
  readonly visited: Uint32Array
  visitedNow = 0
  /** Couplers between the chain under inspection and each other chain, and a tally for one qubit of it. */
  readonly contacts: Int32Array
  readonly tally: Int32Array
  readonly tallied: Int32Array
  /** isNeighbour[u] equals neighbourNow for the interaction partners of the variable under inspection. */
  readonly isNeighbour: Uint32Array
  neighbourNow = 0

  constructor(
    readonly problem: Graph,
    readonly machine: Graph,
    readonly usable: Uint8Array,
  ) {
    const qubits = machine.order
    const variables = problem.order
    this.chains = new Memberships(variables, qubits)
    this.base = new Float64Array(qubits)
    this.history = new Float32Array(qubits)
    this.distance = new Float64Array(qubits)
    this.parent = new Int32Array(qubits)
    this.stamp = new Uint32Array(qubits)
    this.heap = new IndexedHeap(this.distance)
    this.tree = new Int32Array(qubits)
    this.bestTree = new Int32Array(qubits)
    this.saved = new Int32Array(qubits)
    this.wanted = new Uint32Array(variables)
    this.visit = new Int32Array(qubits)
    this.up = new Int32Array(qubits)
    this.treeDegree = new Int32Array(qubits)
    this.visited = new Uint32Array(qubits)
    this.contacts = new Int32Array(variables)
    this.tally = new Int32Array(variables)
    this.tallied = new Int32Array(variables)
    this.isNeighbour = new Uint32Array(variables)
  }

  /** Forgets all chains and the history. */
  clear(): void {
    for (let v = 0; v < this.problem.order; v++) this.chains.drop(v)
    this.history.fill(0)
  }

  /** Sets the factor that each further chain multiplies a qubit's weight by. */
  setPenalty(penalty: number): void {
    this.penaltyOf.fill(penalty ** LARGEST_EXPONENT)
    for (let use = 0; use < LARGEST_EXPONENT; use++) this.penaltyOf[use] = penalty ** use
  }

  /** Puts used qubits out of reach. */
  setStrict(): void {
    this.penaltyOf.fill(Infinity)
    this.penaltyOf[0] = 1
  }

  weight(qubit: number): number {
    return this.base[qubit]! * this.penaltyOf[this.chains.use[qubit]!]!
  }
}
