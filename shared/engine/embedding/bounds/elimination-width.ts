/**
 * The width of an elimination order without carrying the elimination out: the largest column of the Cholesky factor of
 * a matrix with the graph's pattern, less its diagonal. Elimination tree by path compression (Liu, The role of
 * elimination trees in sparse factorization, SIAM J. Matrix Anal. Appl. 11, 1990), column counts from the first leaves
 * of its row subtrees (Gilbert, Ng & Peyton, An efficient algorithm to compute row and column counts for sparse
 * Cholesky factorization, the same, 15, 1994). Almost linear in the edges, however much the elimination would fill in.
 */
import type { Graph } from '../../graph/graph'

const NONE = -1

/** The step at which each vertex is eliminated; −1 for vertices left out. */
function stepsOf(order: number, sequence: Uint32Array): Int32Array {
  const stepOf = new Int32Array(order).fill(NONE)
  for (let step = 0; step < sequence.length; step++) stepOf[sequence[step]!] = step
  return stepOf
}

/** Parent of each step in the elimination tree: the first later step that its column reaches; −1 at roots. */
function eliminationTree(graph: Graph, sequence: Uint32Array, stepOf: Int32Array): Int32Array {
  const parent = new Int32Array(sequence.length).fill(NONE)
  const shortcut = new Int32Array(sequence.length).fill(NONE)
  const { offsets, targets } = graph
  for (let step = 0; step < sequence.length; step++) {
    const v = sequence[step]!
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      let below = stepOf[targets[p]!]!
      if (below >= step) continue
      while (below !== NONE && below < step) {
        const above = shortcut[below]!
        shortcut[below] = step
        if (above === NONE) parent[below] = step
        below = above
      }
    }
  }
  return parent
}

/** Steps with children before parents and each subtree in one run. */
function postorder(parent: Int32Array): Int32Array {
  const count = parent.length
  const firstChild = new Int32Array(count).fill(NONE)
  const sibling = new Int32Array(count).fill(NONE)
  for (let step = count - 1; step >= 0; step--) {
    const above = parent[step]!
    if (above === NONE) continue
    sibling[step] = firstChild[above]!
    firstChild[above] = step
  }
  const sorted = new Int32Array(count)
  let placed = 0
  for (let root = 0; root < count; root++) {
    if (parent[root] !== NONE) continue
    let node = root
    for (;;) {
      while (firstChild[node] !== NONE) {
        const child = firstChild[node]!
        firstChild[node] = sibling[child]!
        node = child
      }
      sorted[placed++] = node
      if (node === root) break
      node = parent[node]!
    }
  }
  return sorted
}

/** The same elimination with its steps in postorder, which changes neither tree nor columns. */
function inPostorder(sequence: Uint32Array, parent: Int32Array): { sequence: Uint32Array; parent: Int32Array } {
  const sorted = postorder(parent)
  const place = new Int32Array(sorted.length)
  for (let i = 0; i < sorted.length; i++) place[sorted[i]!] = i
  const result = { sequence: new Uint32Array(sorted.length), parent: new Int32Array(sorted.length).fill(NONE) }
  for (let i = 0; i < sorted.length; i++) {
    result.sequence[i] = sequence[sorted[i]!]!
    const above = parent[sorted[i]!]!
    if (above !== NONE) result.parent[i] = place[above]!
  }
  return result
}

/** The root of the set that holds `node`, with the path to it halved. */
function rootOf(set: Int32Array, node: number): number {
  let at = node
  while (set[at] !== at) {
    set[at] = set[set[at]!]!
    at = set[at]!
  }
  return at
}

/** 0, 1, 2, … */
function ascending(count: number): Int32Array {
  const numbers = new Int32Array(count)
  for (let i = 0; i < count; i++) numbers[i] = i
  return numbers
}

/** First descendant of each step of a postordered tree. */
function firstDescendants(parent: Int32Array): Int32Array {
  const first = ascending(parent.length)
  for (let step = 0; step < parent.length; step++) {
    const above = parent[step]!
    if (above !== NONE) first[above] = Math.min(first[above]!, first[step]!)
  }
  return first
}

/** Entries of each column, the diagonal counted; steps in postorder. */
function columnCounts(graph: Graph, sequence: Uint32Array, parent: Int32Array): Int32Array {
  const { offsets, targets } = graph
  const stepOf = stepsOf(graph.order, sequence)
  const first = firstDescendants(parent)
  const counts = first.map((descendant, step) => (descendant === step ? 1 : 0))
  const latestFirst = new Int32Array(counts.length).fill(NONE)
  const previousLeaf = new Int32Array(counts.length).fill(NONE)
  const set = ascending(counts.length)
  for (let step = 0; step < counts.length; step++) {
    if (parent[step] !== NONE) counts[parent[step]!]!--
    const v = sequence[step]!
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const row = stepOf[targets[p]!]!
      if (row <= step || first[step]! <= latestFirst[row]!) continue
      latestFirst[row] = first[step]!
      counts[step]!++
      if (previousLeaf[row] !== NONE) counts[rootOf(set, previousLeaf[row]!)]!--
      previousLeaf[row] = step
    }
    if (parent[step] !== NONE) set[step] = parent[step]!
  }
  for (let step = 0; step < counts.length; step++) if (parent[step] !== NONE) counts[parent[step]!]! += counts[step]!
  return counts
}

/**
 * Most neighbours that a vertex has when its turn comes, if the vertices of `sequence` are eliminated one by one and
 * the neighbours of each are joined: an upper bound on the treewidth of the subgraph of these vertices.
 * @param sequence distinct vertices; those left out do not count as neighbours
 */
export function eliminationWidth(graph: Graph, sequence: Uint32Array): number {
  const given = eliminationTree(graph, sequence, stepsOf(graph.order, sequence))
  const { sequence: sorted, parent } = inPostorder(sequence, given)
  return columnCounts(graph, sorted, parent).reduce((most, count) => Math.max(most, count - 1), 0)
}
