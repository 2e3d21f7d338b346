import type { Graph } from '../../shared/engine/graph/graph'
import type { Random } from '../../shared/engine/random'

/**
 * The yardstick of the benchmark: the rerouting heuristic of Cai, Macready & Roy (A practical heuristic for finding graph
 * minors, arXiv:1406.2741, 2014), written from the paper's idea alone; it shares no code with the engine. One chain at a
 * time is dropped and made anew: a qubit that already carries u other chains weighs diameter^u; the weighted distances
 * from the chain of each placed neighbour to all qubits are found; the root is the qubit of least sum, and the chain the
 * union of the paths from there. Passes over all variables go on until no qubit is shared, then for as long as they make
 * the longest chain or the total smaller. One rule is added, without which the heuristic falls far behind: the outer half
 * of a path belongs to the neighbour that it leads to.
 */
export interface BaselineResult {
  /** Best valid embedding, one array of qubits a variable; null when none was found in time. */
  readonly chains: number[][] | null
  /** Seconds on the given clock to the first valid embedding. */
  readonly firstSeconds: number | null
  /** Qubits of that first one; the passes that follow take many away. */
  readonly firstQubits: number | null
  readonly seconds: number
}

const SETTINGS = {
  /** Passes without less overlap after which everything begins anew. */
  idlePasses: 12,
  /** Passes without a better valid embedding after which the search is done. */
  idlePassesAfterSuccess: 10,
  /** Weights above this are no larger, so that sums of them stay exact. */
  largestWeight: 2 ** 40,
}

/** Largest distance found by a few breadth-first sweeps, each from the farthest qubit of the last: diameter or little less. */
function diameterOf(machine: Graph, usable: Uint8Array): number {
  let from = usable.indexOf(1)
  let longest = 2
  for (let sweep = 0; sweep < 4 && from >= 0; sweep++) {
    const distance = new Int32Array(machine.order).fill(-1)
    const queue = [from]
    distance[from] = 0
    for (const q of queue) {
      for (let s = machine.offsets[q]!; s < machine.offsets[q + 1]!; s++) {
        const r = machine.targets[s]!
        if (!usable[r] || distance[r]! >= 0) continue
        distance[r] = distance[q]! + 1
        queue.push(r)
      }
    }
    from = queue[queue.length - 1]!
    longest = Math.max(longest, distance[from]!)
  }
  return longest
}

/** Binary heap of (key, item), least key first; may hold an item many times. */
class BinaryHeap {
  private keys = new Float64Array(1024)
  private items = new Int32Array(1024)
  size = 0

  push(key: number, item: number): void {
    if (this.size === this.keys.length) this.double()
    const { keys, items } = this
    let at = this.size++
    while (at > 0) {
      const parent = (at - 1) >> 1
      if (keys[parent]! <= key) break
      keys[at] = keys[parent]!
      items[at] = items[parent]!
      at = parent
    }
    keys[at] = key
    items[at] = item
  }

  leastKey(): number {
    return this.keys[0]!
  }

  pop(): number {
    const { keys, items } = this
    const least = items[0]!
    const size = --this.size
    const key = keys[size]!
    let at = 0
    for (let child = 1; child < size; child = 2 * at + 1) {
      if (child + 1 < size && keys[child + 1]! < keys[child]!) child++
      if (keys[child]! >= key) break
      keys[at] = keys[child]!
      items[at] = items[child]!
      at = child
    }
    keys[at] = key
    items[at] = items[size]!
    return least
  }

  private double(): void {
    const keys = new Float64Array(2 * this.keys.length)
    const items = new Int32Array(2 * this.items.length)
    keys.set(this.keys)
    items.set(this.items)
    this.keys = keys
    this.items = items
  }
}

class Rerouting {
  readonly chains: number[][]
  private readonly use: Int32Array
  private readonly weights: Float64Array
  private readonly usableQubits: Int32Array
  /** Field f of the neighbours being joined is slots f·order … f·order + order − 1 of distance and parent. */
  private readonly distance: Float64Array
  private readonly parent: Int32Array
  private readonly touched: number[] = []
  private readonly settled: Int32Array
  private readonly sum: Float64Array
  private readonly seen: number[] = []
  private readonly heap = new BinaryHeap()
  private readonly pathsThrough: Int32Array
  overlap = 0

  constructor(
    private readonly problem: Graph,
    private readonly machine: Graph,
    usable: Uint8Array,
    private readonly random: Random,
    diameter: number,
  ) {
    let mostNeighbours = 1
    for (let v = 0; v < problem.order; v++)
      mostNeighbours = Math.max(mostNeighbours, problem.offsets[v + 1]! - problem.offsets[v]!)
    const { order } = machine
    this.chains = Array.from({ length: problem.order }, () => [])
    this.use = new Int32Array(order)
    this.weights = Float64Array.from({ length: problem.order + 1 }, (_, u) =>
      Math.min(SETTINGS.largestWeight, diameter ** u),
    )
    this.usableQubits = Int32Array.from(Array.from({ length: order }, (_, q) => q).filter((q) => usable[q] === 1))
    this.distance = new Float64Array(mostNeighbours * order).fill(Infinity)
    // A broken qubit is nearer than any path could make it, so it is never reached.
    for (let q = 0; q < order; q++)
      if (!usable[q]) for (let f = 0; f < mostNeighbours; f++) this.distance[f * order + q] = -1
    this.parent = new Int32Array(mostNeighbours * order)
    this.settled = new Int32Array(order)
    this.sum = new Float64Array(order)
    this.pathsThrough = new Int32Array(order)
  }

  clear(): void {
    this.chains.forEach((chain) => (chain.length = 0))
    this.use.fill(0)
    this.overlap = 0
  }

  /** Drops the chain of variable v and makes it anew. False when no qubit is joined to all placed neighbours. */
  reroute(v: number): boolean {
    this.drop(v)
    const neighbours: number[] = []
    const { offsets, targets } = this.problem
    for (let s = offsets[v]!; s < offsets[v + 1]!; s++)
      if (this.chains[targets[s]!]!.length > 0) neighbours.push(targets[s]!)
    if (neighbours.length === 0) {
      this.take(v, this.freeQubit())
      return true
    }
    const root = this.findRoot(neighbours)
    if (root >= 0) this.join(v, root, neighbours)
    this.forget()
    return root >= 0
  }

  private freeQubit(): number {
    const { usableQubits, random } = this
    let best = usableQubits[random.below(usableQubits.length)]!
    for (let draw = 0; draw < 20 && this.use[best]! > 0; draw++) best = usableQubits[random.below(usableQubits.length)]!
    return best
  }

  private drop(v: number): void {
    for (const q of this.chains[v]!) if (--this.use[q]! > 0) this.overlap--
    this.chains[v]!.length = 0
  }

  private take(v: number, q: number): void {
    if (this.use[q]!++ > 0) this.overlap++
    this.chains[v]!.push(q)
  }

  private reach(slot: number, distance: number, parent: number): void {
    if (distance >= this.distance[slot]!) return
    if (this.distance[slot] === Infinity) this.touched.push(slot)
    this.distance[slot] = distance
    this.parent[slot] = parent
    this.heap.push(distance, slot)
  }

  /**
   * Dijkstra's algorithm from all neighbours' chains at once, each in its own field. The distance of a qubit is the
   * weight of the path's qubits outside the chain, itself included. A qubit's sum counts its own weight once; as one
   * that some field has not reached yet cannot have a smaller sum than the radius, the search ends there.
   */
  private findRoot(neighbours: readonly number[]): number {
    const { heap, machine, distance, use, weights, settled, sum } = this
    const { order, offsets, targets } = machine
    const fields = neighbours.length
    heap.size = 0
    neighbours.forEach((u, f) => {
      for (const q of this.chains[u]!) this.startFrom(f * order, q)
    })
    let root = -1
    let least = Infinity
    let ties = 0
    while (heap.size > 0 && heap.leastKey() <= least) {
      const key = heap.leastKey()
      const slot = heap.pop()
      if (key > distance[slot]!) continue
      const field = Math.floor(slot / order)
      const q = slot - field * order
      const own = weights[use[q]!]!
      if (settled[q]! === 0) {
        this.seen.push(q)
        sum[q] = own
      }
      sum[q] = sum[q]! + key - own
      if (++settled[q]! === fields && sum[q]! <= least) {
        ties = sum[q]! < least ? 1 : ties + 1
        least = sum[q]!
        if (this.random.below(ties) === 0) root = q
      }
      if (this.parent[slot]! < 0) continue
      for (let s = offsets[q]!; s < offsets[q + 1]!; s++) {
        const r = targets[s]!
        this.reach(field * order + r, key + weights[use[r]!]!, q)
      }
    }
    return root
  }

  /** A chain's own qubits cost their weight as roots, but nothing to leave from. */
  private startFrom(base: number, q: number): void {
    const { offsets, targets } = this.machine
    const slot = base + q
    this.reach(slot, this.weights[this.use[q]!]!, -1)
    this.parent[slot] = -1
    for (let s = offsets[q]!; s < offsets[q + 1]!; s++) {
      const r = targets[s]!
      this.reach(base + r, this.weights[this.use[r]!]!, q)
    }
  }

  /** The path of field f from the root to the chain it leads to, root first, without the chain's own qubits. */
  private pathTo(root: number, field: number): number[] {
    const base = field * this.machine.order
    const path = [root]
    for (let q = this.parent[base + root]!; q >= 0 && this.parent[base + q]! >= 0; q = this.parent[base + q]!)
      path.push(q)
    return path
  }

  private join(v: number, root: number, neighbours: readonly number[]): void {
    const paths = neighbours.map((_, f) => this.pathTo(root, f))
    for (const path of paths) for (const q of path) this.pathsThrough[q]!++
    this.take(v, root)
    paths.forEach((path, f) => {
      let keep = path.length
      while (keep > Math.ceil(path.length / 2) && this.pathsThrough[path[keep - 1]!] === 1) keep--
      for (let k = 1; k < path.length; k++) {
        const q = path[k]!
        if (k >= keep) this.take(neighbours[f]!, q)
        else if (this.pathsThrough[q]! > 0) {
          this.take(v, q)
          this.pathsThrough[q] = 0
        }
      }
    })
    for (const path of paths) for (const q of path) this.pathsThrough[q] = 0
  }

  private forget(): void {
    for (const slot of this.touched) this.distance[slot] = Infinity
    for (const q of this.seen) this.settled[q] = 0
    this.touched.length = 0
    this.seen.length = 0
  }
}

function shuffled(n: number, random: Random): number[] {
  const items = Array.from({ length: n }, (_, i) => i)
  for (let i = n - 1; i > 0; i--) {
    const j = random.below(i + 1)
    ;[items[i], items[j]] = [items[j]!, items[i]!]
  }
  return items
}

const totalOf = (chains: readonly number[][]): number => chains.reduce((sum, { length }) => sum + length, 0)
const longestOf = (chains: readonly number[][]): number =>
  chains.reduce((most, { length }) => Math.max(most, length), 0)

/** Runs the heuristic until it no longer makes the embedding better, or the time is up. Fewest qubits are kept. */
export function baselineEmbedding(
  problem: Graph,
  machine: Graph,
  usable: Uint8Array,
  random: Random,
  { timeLimitSeconds, now }: { timeLimitSeconds: number; now: () => number },
): BaselineResult {
  const began = now()
  const seconds = (): number => now() - began
  const rerouting = new Rerouting(problem, machine, usable, random, diameterOf(machine, usable))
  let best: number[][] | null = null
  let firstSeconds: number | null = null
  let firstQubits: number | null = null
  let [leastOverlap, idle] = [Infinity, 0]

  /** One pass; false when the time was up before its end. */
  const pass = (): boolean => {
    for (const v of shuffled(problem.order, random)) {
      if (seconds() >= timeLimitSeconds) return false
      if (!rerouting.reroute(v)) return false
    }
    return true
  }
  const takeBest = (): boolean => {
    const { chains } = rerouting
    const [total, longest] = [totalOf(chains), longestOf(chains)]
    if (best && (total > totalOf(best) || (total === totalOf(best) && longest >= longestOf(best)))) return false
    best = chains.map((chain) => [...chain])
    firstSeconds ??= seconds()
    firstQubits ??= total
    return true
  }

  while (pass()) {
    const valid = rerouting.overlap === 0
    const better = valid ? takeBest() : !best && rerouting.overlap < leastOverlap
    leastOverlap = Math.min(leastOverlap, rerouting.overlap)
    idle = better ? 0 : idle + 1
    if (best && idle >= SETTINGS.idlePassesAfterSuccess) break
    if (!best && idle >= SETTINGS.idlePasses) {
      rerouting.clear()
      leastOverlap = Infinity
      idle = 0
    }
  }
  return { chains: best, firstSeconds, firstQubits, seconds: seconds() }
}
