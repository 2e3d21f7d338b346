import type { Programmed } from '../programming/programme'

/** What stands for the pull on couplers that lie in a cycle of their chain, and on qubits that no one break cuts off. */
export const NO_PULL = -1

/**
 * How hard the surroundings may pull a chain apart, in units of the coupling that holds it there. Above 1 a ground state
 * may break the chain at that place.
 */
export interface Pulls {
  /** Of each programmed coupler; NO_PULL on those in a cycle of their chain, and on interaction couplers. */
  readonly couplers: Float32Array
  /**
   * Of each position: the greatest pull on a coupler whose break alone would leave the qubit on the lesser side of its
   * chain; NO_PULL where there is none.
   */
  readonly qubits: Float32Array
}

/** One chain: positions, and the ends of its couplers in local numbers with their programmed indices. */
interface Chain {
  readonly positions: number[]
  readonly ends: number[]
  readonly couplers: number[]
}

interface Tree {
  /** Local qubits, every one after its parent; the first is the root. */
  readonly order: number[]
  readonly parent: Int32Array
  /** Coupler (index into the chain's) to the parent. */
  readonly via: Int32Array
  readonly depth: Int32Array
  /** Qubits at and below each. */
  readonly below: Int32Array
}

function chainsOf({ chainOf, chainStrength, ends, isChainCoupler }: Programmed): Chain[] {
  const chains: Chain[] = Array.from(chainStrength, () => ({ positions: [], ends: [], couplers: [] }))
  const local = new Uint32Array(chainOf.length)
  chainOf.forEach((i, p) => (local[p] = chains[i]!.positions.push(p) - 1))
  isChainCoupler.forEach((inside, c) => {
    if (!inside) return
    const [a, b] = [ends[2 * c]!, ends[2 * c + 1]!]
    const chain = chains[chainOf[a]!]!
    chain.ends.push(local[a]!, local[b]!)
    chain.couplers.push(c)
  })
  return chains
}

function treeFrom(root: number, { positions, ends }: Chain): Tree {
  const size = positions.length
  const slots: number[][] = Array.from({ length: size }, () => [])
  for (let k = 0; k < ends.length; k++) slots[ends[k]!]!.push(k)
  const [parent, via] = [new Int32Array(size).fill(-1), new Int32Array(size).fill(-1)]
  const [depth, below] = [new Int32Array(size).fill(-1), new Int32Array(size).fill(1)]
  const order = [root]
  depth[root] = 0
  for (const q of order)
    for (const slot of slots[q]!) {
      const next = ends[slot ^ 1]!
      if (depth[next]! >= 0) continue
      parent[next] = q
      via[next] = slot >> 1
      depth[next] = depth[q]! + 1
      order.push(next)
    }
  for (let k = order.length - 1; k > 0; k--) below[parent[order[k]!]!]! += below[order[k]!]!
  return { order, parent, via, depth, below }
}

/** A spanning tree whose root has at most half of the chain under any of its neighbours. */
function centredTree(chain: Chain): Tree {
  const tree = treeFrom(0, chain)
  let centre = 0
  for (const q of tree.order) if (2 * tree.below[q]! >= chain.positions.length) centre = q
  return treeFrom(centre, chain)
}

/** 1 for each qubit whose coupler to its parent lies in a cycle: no single break there parts the chain. */
function cycled({ ends, couplers }: Chain, { parent, via, depth }: Tree): Uint8Array {
  const covered = new Uint8Array(parent.length)
  couplers.forEach((_, k) => {
    let [a, b] = [ends[2 * k]!, ends[2 * k + 1]!]
    if (via[a] === k || via[b] === k) return
    while (a !== b) {
      if (depth[a]! < depth[b]!) [a, b] = [b, a]
      covered[a] = 1
      a = parent[a]!
    }
  })
  return covered
}

/** Σ|interaction couplings| at each position. */
function externalCoupling({ chainOf, ends, isChainCoupler, J }: Programmed): Float64Array {
  const sums = new Float64Array(chainOf.length)
  isChainCoupler.forEach((inside, c) => {
    if (inside) return
    sums[ends[2 * c]!]! += Math.abs(J[c]!)
    sums[ends[2 * c + 1]!]! += Math.abs(J[c]!)
  })
  return sums
}

/**
 * The pull on every coupler inside a chain and on every qubit, from the programmed values. With X the sum of |external
 * couplings| and F the sum of fields of a side, a coupler of strength k that alone joins the sides S and R is pulled by
 * max over σ of min(X_S − σF_S, X_R + σF_R) / k (the cut bound of docs/formulas.md at one coupler).
 */
export function chainPulls(programmed: Programmed): Pulls {
  const external = externalCoupling(programmed)
  const couplers = new Float32Array(programmed.J.length).fill(NO_PULL)
  const qubits = new Float32Array(programmed.chainOf.length).fill(NO_PULL)
  for (const chain of chainsOf(programmed)) {
    if (chain.positions.length < 2) continue
    const tree = centredTree(chain)
    const inCycle = cycled(chain, tree)
    const up = Float64Array.from(chain.positions, (p) => external[p]! - programmed.h[p]!)
    const down = Float64Array.from(chain.positions, (p) => external[p]! + programmed.h[p]!)
    const { order, parent, via, below } = tree
    for (let k = order.length - 1; k > 0; k--) {
      up[parent[order[k]!]!]! += up[order[k]!]!
      down[parent[order[k]!]!]! += down[order[k]!]!
    }
    const root = order[0]!
    for (const q of order.slice(1)) {
      const p = chain.positions[q]!
      qubits[p] = qubits[chain.positions[parent[q]!]!]!
      if (inCycle[q]) continue
      const c = chain.couplers[via[q]!]!
      const worst = Math.max(Math.min(up[q]!, down[root]! - down[q]!), Math.min(up[root]! - up[q]!, down[q]!))
      couplers[c] = Math.max(0, worst) / Math.max(Number.MIN_VALUE, Math.abs(programmed.J[c]!))
      if (2 * below[q]! < chain.positions.length) qubits[p] = Math.max(qubits[p]!, couplers[c]!)
    }
  }
  return { couplers, qubits }
}
