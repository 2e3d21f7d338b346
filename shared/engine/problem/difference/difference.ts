import { matchVariables } from './match-variables'
import type { NamedProblem } from './match-variables'

/** A coefficient that is not the same in both; null on the side where there is none. */
export interface TermChange {
  /** One label for a linear coefficient, two for an interaction; as the later problem calls them. */
  readonly labels: readonly string[]
  readonly before: number | null
  readonly after: number | null
}

/**
 * How the interactions of the later problem stand to those of the earlier one: an embedding of the earlier one holds for
 * the later one where they are the same, or fewer among the same variables or some of them.
 */
export type GraphStanding = 'same' | 'fewer' | 'changed'

export interface ProblemDifference {
  /** Labels of the variables that are new, gone, and called otherwise (before, after). */
  readonly added: string[]
  readonly removed: string[]
  readonly renamed: [string, string][]
  /** Linear coefficients of variables in both that differ. */
  readonly linearChanged: number
  readonly interactionsAdded: number
  readonly interactionsRemoved: number
  /** Interactions in both whose values differ. */
  readonly interactionsChanged: number
  /** The first changes of coefficients, linear ones before interactions, in the later problem's order. */
  readonly changes: TermChange[]
  readonly offset: { readonly before: number; readonly after: number }
  readonly graph: GraphStanding
}

interface Pairs {
  /** lower · n + higher of the after-indices, ascending. */
  readonly keys: Float64Array
  readonly values: Float64Array
}

/** The earlier interactions whose ends both are in the later problem, by the later problem's indices. */
function carriedPairs({ problem }: NamedProblem, places: Int32Array, n: number): Pairs {
  const carried: number[] = []
  const keyOf = new Float64Array(problem.values.length)
  let isSorted = true
  problem.values.forEach((_, k) => {
    const [a, b] = [places[problem.rows[k]!]!, places[problem.cols[k]!]!]
    if (a < 0 || b < 0) return
    keyOf[k] = Math.min(a, b) * n + Math.max(a, b)
    const last = carried.at(-1)
    if (last !== undefined && keyOf[last]! > keyOf[k]!) isSorted = false
    carried.push(k)
  })
  if (!isSorted) carried.sort((x, y) => keyOf[x]! - keyOf[y]!)
  return {
    keys: Float64Array.from(carried, (k) => keyOf[k]!),
    values: Float64Array.from(carried, (k) => problem.values[k]!),
  }
}

const pairsOf = ({ problem: { n, rows, cols, values } }: NamedProblem): Pairs => ({
  keys: Float64Array.from(values, (_, k) => rows[k]! * n + cols[k]!),
  values,
})

interface Collected {
  added: number
  removed: number
  changed: number
  changes: TermChange[]
}

/** Walks both sorted lists of interactions side by side. */
function compareInteractions(before: Pairs, after: Pairs, labels: readonly string[], room: number): Collected {
  const found: Collected = { added: 0, removed: 0, changed: 0, changes: [] }
  const n = labels.length
  const tell = (key: number, was: number | null, is: number | null): void => {
    if (found.changes.length < room)
      found.changes.push({ labels: [labels[Math.floor(key / n)]!, labels[key % n]!], before: was, after: is })
  }
  for (let b = 0, a = 0; b < before.keys.length || a < after.keys.length;) {
    const [was, is] = [before.keys[b] ?? Infinity, after.keys[a] ?? Infinity]
    if (was < is) {
      found.removed++
      tell(was, before.values[b++]!, null)
    } else if (is < was) {
      found.added++
      tell(is, null, after.values[a++]!)
    } else {
      if (before.values[b] !== after.values[a]) {
        found.changed++
        tell(was, before.values[b]!, after.values[a]!)
      }
      b++
      a++
    }
  }
  return found
}

const standingOf = (added: number, removed: number): GraphStanding => {
  if (added > 0) return 'changed'
  return removed > 0 ? 'fewer' : 'same'
}

/**
 * What was changed from one problem to another. Both are to be given in the same form and sense; values are compared to
 * the last bit. Variables are matched by label, then by what is said of them (see match-variables.ts).
 *
 * @param shown at most as many changes of coefficients are listed; all are counted
 */
export function differenceOf(before: NamedProblem, after: NamedProblem, shown: number): ProblemDifference {
  const places = matchVariables(before, after)
  const isKept = new Uint8Array(after.labels.length)
  const removed: string[] = []
  const renamed: [string, string][] = []
  const changes: { place: number; change: TermChange }[] = []
  places.forEach((j, i) => {
    const label = before.labels[i]!
    if (j < 0) return void removed.push(label)
    isKept[j] = 1
    if (after.labels[j] !== label) renamed.push([label, after.labels[j]!])
    const [was, is] = [before.problem.linear[i]!, after.problem.linear[j]!]
    if (was !== is) changes.push({ place: j, change: { labels: [after.labels[j]!], before: was, after: is } })
  })
  const added = after.labels.filter((_, j) => isKept[j] === 0)
  changes.sort((a, b) => a.place - b.place)
  const linear = changes.slice(0, shown).map(({ change }) => change)
  const carried = carriedPairs(before, places, after.labels.length)
  const pairs = compareInteractions(carried, pairsOf(after), after.labels, shown - linear.length)
  const interactionsRemoved = pairs.removed + before.problem.values.length - carried.keys.length
  return {
    added,
    removed,
    renamed,
    linearChanged: changes.length,
    interactionsAdded: pairs.added,
    interactionsRemoved,
    interactionsChanged: pairs.changed,
    changes: [...linear, ...pairs.changes],
    offset: { before: before.problem.offset, after: after.problem.offset },
    graph: standingOf(added.length + pairs.added, removed.length + interactionsRemoved),
  }
}
