import { layOut } from './layout'
import type { Layout, LayoutInput } from './layout'

/*
 * How strong a chain must be so that no ground state breaks it, whatever the rest of the problem does.
 *
 * Let X_q = Σ|external couplings| and h_q the field of qubit q of the chain, a_q = X_q − h_q and b_q = X_q + h_q. A state
 * with the part S up and the rest R down costs at least 2·(k·cut − a(S)) more than the same state with S turned down, and
 * at least 2·(k·cut − b(R)) more than with R turned up. So it is no ground state if k·cut(S) > min(a(S), b(R)), and
 *     bound = max over S of min(a(S), b(R)) / cut(S)
 * is enough for every chain on its own. It is also the best that holds for every surrounding: where couplings pull S up
 * and R down with all their strength, both differences above are reached.
 *
 * Tree chains with |h_q| ≤ X_q on every qubit: the splits at one coupler reach the maximum. Proof: let (S, R) have c cut
 * couplers, a(S) ≥ kc and b(R) ≥ kc with k > 0, and suppose that no split at a cut coupler, in either orientation, reaches
 * k. The case c = 1 is immediate. For c ≥ 2 the two sides A, B of a cut coupler have a(A) + a(B) ≥ 2k and
 * b(A) + b(B) ≥ 2k, so one side has a ≥ k and one has b ≥ k. By supposition they are the same side, call it heavy, and
 * the light side has a < k and b < k. Point every cut coupler to its heavy side. Some component of the chain without the
 * cut couplers has all its d ≤ c cut couplers pointing to it, as the components form a tree. If it is up, all of R
 * hangs on its d light sides, so b(R) < dk ≤ ck; if it is down, a(S) < dk ≤ ck. Contradiction. (a, b ≥ 0 was used.)
 *
 * With a stronger field on some qubit this fails: in a path whose two long ends follow the field while its middle is pulled
 * against it, cutting both sides of the middle can be worse than any single cut. There a⁺ = max(0, a), b⁺ = max(0, b)
 * take the place of a, b: a(S) ≤ a⁺(S) and b(R) ≤ b⁺(R), so the single-coupler bound with a⁺, b⁺ is safe.
 *
 * Chains with cycles: a split cuts at least as many couplers of the chain as of a spanning tree of it, so the bound of any
 * spanning tree is safe.
 *
 * Chains of at most `enumeratedLength` qubits are enumerated wherever the one pass is not exact.
 */
const DEFAULTS = { enumeratedLength: 12 }

export interface CutBounds {
  /** Per variable, in logical units, ≥ 0: a strength above it keeps the chain unbroken in every ground state. */
  readonly bound: Float64Array
  /** 1 where no smaller value has this property in every surrounding; 0 where `bound` is a safe upper bound of that value. */
  readonly exact: Uint8Array
  /** The split that the bound comes from: bound = max(0, min(up, down) / cut). */
  readonly splits: readonly Split[]
}

/** A chain with its part S up and the rest R down. */
export interface Split {
  /** a(S), and b(R), in logical units. */
  readonly up: number
  readonly down: number
  /** Couplers of the chain between the two; of its spanning tree where the bound is not exact. */
  readonly cut: number
}

const NO_SPLIT: Split = { up: 0, down: 0, cut: 1 }
const boundBy = ({ up, down, cut }: Split): number => Math.min(up, down) / cut
const worse = (one: Split, other: Split): Split => (boundBy(other) > boundBy(one) ? other : one)

/** One chain in local numbering 0 … length − 1. */
interface Chain {
  readonly up: Float64Array
  readonly down: Float64Array
  /** Local ends of the chain couplers, two per coupler. */
  readonly ends: readonly number[]
}

function chainsOf(layout: Layout): Chain[] {
  const ends: number[][] = Array.from({ length: layout.n }, () => [])
  const local = new Uint32Array(layout.qubits.length)
  const filled = new Uint32Array(layout.n)
  const up = Array.from(layout.chainLength, (length) => new Float64Array(length))
  const down = Array.from(layout.chainLength, (length) => new Float64Array(length))
  layout.chainOf.forEach((i, p) => {
    local[p] = filled[i]!++
    up[i]![local[p]!] = layout.externalCoupling[p]! - layout.h[p]!
    down[i]![local[p]!] = layout.externalCoupling[p]! + layout.h[p]!
  })
  layout.isChainCoupler.forEach((inside, c) => {
    if (inside)
      ends[layout.chainOf[layout.ends[2 * c]!]!]!.push(local[layout.ends[2 * c]!]!, local[layout.ends[2 * c + 1]!]!)
  })
  return ends.map((list, i) => ({ up: up[i]!, down: down[i]!, ends: list }))
}

/** Breadth-first order and parents of a spanning tree from qubit 0. */
function spanningTree({ up, ends }: Chain): { order: number[]; parent: Int32Array } {
  const neighbours: number[][] = Array.from(up, () => [])
  for (let e = 0; e < ends.length; e += 2) {
    neighbours[ends[e]!]!.push(ends[e + 1]!)
    neighbours[ends[e + 1]!]!.push(ends[e]!)
  }
  const parent = new Int32Array(up.length).fill(-1)
  const order = [0]
  for (let k = 0; k < order.length; k++) {
    for (const q of neighbours[order[k]!]!) {
      if (q === 0 || parent[q] !== -1) continue
      parent[q] = order[k]!
      order.push(q)
    }
  }
  return { order, parent }
}

/** The split of greatest min(up(A), down(B)) at one coupler of the spanning tree, both orientations. */
function singleCouplerSplit(chain: Chain, up: Float64Array, down: Float64Array): Split {
  const { order, parent } = spanningTree(chain)
  const upBelow = up.slice()
  const downBelow = down.slice()
  for (let k = order.length - 1; k > 0; k--) {
    upBelow[parent[order[k]!]!]! += upBelow[order[k]!]!
    downBelow[parent[order[k]!]!]! += downBelow[order[k]!]!
  }
  let worst: Split = { up: -Infinity, down: -Infinity, cut: 1 }
  for (let k = 1; k < order.length; k++) {
    const q = order[k]!
    worst = worse(worst, { up: upBelow[q]!, down: downBelow[0]! - downBelow[q]!, cut: 1 })
    worst = worse(worst, { up: upBelow[0]! - upBelow[q]!, down: downBelow[q]!, cut: 1 })
  }
  return worst
}

/** The worst of all splits; sums of subsets are built from smaller subsets, so that nothing drifts. */
function enumeratedSplit({ up, down, ends }: Chain): Split {
  const length = up.length
  const adjacency = new Uint32Array(length)
  for (let e = 0; e < ends.length; e += 2) {
    adjacency[ends[e]!]! |= 1 << ends[e + 1]!
    adjacency[ends[e + 1]!]! |= 1 << ends[e]!
  }
  const bitCount = (x: number): number => (x === 0 ? 0 : 1 + bitCount(x & (x - 1)))
  const full = (1 << length) - 1
  const upSum = new Float64Array(full + 1)
  const downSum = new Float64Array(full + 1)
  const cut = new Int32Array(full + 1)
  for (let set = 1; set <= full; set++) {
    const q = 31 - Math.clz32(set & -set)
    const smaller = set & (set - 1)
    upSum[set] = upSum[smaller]! + up[q]!
    downSum[set] = downSum[smaller]! + down[q]!
    cut[set] = cut[smaller]! + bitCount(adjacency[q]!) - 2 * bitCount(adjacency[q]! & smaller)
  }
  let worst = -1
  let bound = -Infinity
  for (let set = 1; set < full; set++) {
    const own = Math.min(upSum[set]!, downSum[full ^ set]!) / cut[set]!
    if (own <= bound) continue
    bound = own
    worst = set
  }
  return { up: upSum[worst]!, down: downSum[full ^ worst]!, cut: cut[worst]! }
}

function worstSplitOf(chain: Chain): { split: Split; exact: boolean } {
  const length = chain.up.length
  if (length === 1) return { split: NO_SPLIT, exact: true }
  const safe = singleCouplerSplit(
    chain,
    chain.up.map((x) => Math.max(0, x)),
    chain.down.map((x) => Math.max(0, x)),
  )
  if (boundBy(safe) <= 0) return { split: NO_SPLIT, exact: true }
  const isTree = chain.ends.length / 2 === length - 1
  if (isTree && boundBy(singleCouplerSplit(chain, chain.up, chain.down)) === boundBy(safe))
    return { split: safe, exact: true }
  if (length <= DEFAULTS.enumeratedLength) return { split: enumeratedSplit(chain), exact: true }
  return { split: safe, exact: false }
}

/**
 * For every chain, a strength (logical units) above which no ground state of the programmed problem breaks it, however
 * fields and couplings were split: the cut bound of docs/formulas.md. Linear time for tree chains whose fields nowhere
 * exceed the external coupling, 2^length for other chains of up to 12 qubits, linear and safe but not exact beyond.
 * Related work: Choi, Minor-embedding in adiabatic quantum computation I, arXiv:0804.4884 (2008).
 * @throws RangeError for an embedding that does not fit problem and machine
 */
export function cutBounds(input: LayoutInput): CutBounds {
  return cutBoundsOf(layOut(input))
}

/** The same for a problem that is laid out already. */
export function cutBoundsOf(layout: Layout): CutBounds {
  const worst = chainsOf(layout).map(worstSplitOf)
  return {
    bound: Float64Array.from(worst, ({ split }) => Math.max(0, boundBy(split))),
    exact: Uint8Array.from(worst, ({ exact }) => (exact ? 1 : 0)),
    splits: worst.map(({ split }) => split),
  }
}
