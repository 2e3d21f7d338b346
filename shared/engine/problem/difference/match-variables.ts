/**
 * Which variable of one problem is which of another. Labels decide first. A variable whose label is gone and one whose
 * label is new are one and the same, renamed, where all that is said of them agrees: the linear coefficient and every
 * interaction, each with a variable that is matched too. The names are found by colour refinement (as in Weisfeiler &
 * Lehman 1968): what is matched already tells the rest apart. Every match found this way is checked afterwards, so a
 * wrong guess can only leave a rename unseen, never invent one.
 */
import type { Problem } from '../problem'

export interface NamedProblem {
  readonly labels: readonly string[]
  readonly problem: Problem
}

const DEFAULTS = {
  /** Above this many variables with new labels, no names are guessed unless the problems agree place by place. */
  maxUnmatched: 5000,
  maxRounds: 32,
}

interface Adjacency {
  readonly offsets: Uint32Array
  readonly targets: Uint32Array
  readonly values: Float64Array
}

function adjacencyOf({ n, rows, cols, values }: Problem): Adjacency {
  const offsets = new Uint32Array(n + 1)
  for (const ends of [rows, cols]) for (const v of ends) offsets[v + 1]!++
  for (let v = 0; v < n; v++) offsets[v + 1]! += offsets[v]!
  const next = offsets.slice(0, n)
  const targets = new Uint32Array(2 * values.length)
  const weights = new Float64Array(2 * values.length)
  values.forEach((value, k) => {
    const [a, b] = [rows[k]!, cols[k]!]
    targets[next[a]!] = b
    weights[next[a]!++] = value
    targets[next[b]!] = a
    weights[next[b]!++] = value
  })
  return { offsets, targets, values: weights }
}

const sameNumbers = (a: ArrayLike<number>, b: ArrayLike<number>): boolean => {
  if (a.length !== b.length) return false
  for (let k = 0; k < a.length; k++) if (a[k] !== b[k]) return false
  return true
}

const agreeByPlace = (a: Problem, b: Problem): boolean =>
  sameNumbers(a.linear, b.linear) &&
  sameNumbers(a.rows, b.rows) &&
  sameNumbers(a.cols, b.cols) &&
  sameNumbers(a.values, b.values)

/** What is known of a variable: its linear coefficient, and its interactions by the mark of the other end. */
function signature(v: number, linear: number, { offsets, targets, values }: Adjacency, markOf: Int32Array) {
  const terms: string[] = []
  let isComplete = true
  for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
    const mark = markOf[targets[p]!]!
    if (mark < 0) isComplete = false
    terms.push(`${mark} ${values[p]!}`)
  }
  return { key: `${linear}|${terms.sort().join(',')}`, isComplete }
}

const unmarked = (marks: Int32Array): number[] => Array.from(marks.keys()).filter((v) => marks[v]! < 0)

interface Candidates {
  before: number[]
  after: number[]
  isComplete: boolean
}

/** Works on both sides of a comparison: places[i] is the after-index of before-variable i, or −1. */
class Matching {
  readonly places: Int32Array
  /** marks[j] is j where after-variable j is matched, else −1. */
  private readonly marks: Int32Array
  private readonly edges: { before: Adjacency; after: Adjacency }

  constructor(
    private readonly before: NamedProblem,
    private readonly after: NamedProblem,
  ) {
    this.places = new Int32Array(before.problem.n).fill(-1)
    this.marks = new Int32Array(after.problem.n).fill(-1)
    this.edges = { before: adjacencyOf(before.problem), after: adjacencyOf(after.problem) }
  }

  set(i: number, j: number): void {
    this.places[i] = j
    this.marks[j] = j
  }

  /** One round of refinement; how many were matched in it. */
  round(): number {
    const bySignature = new Map<string, Candidates>()
    const collect = (side: 'before' | 'after', marks: Int32Array): void => {
      for (const v of unmarked(marks)) {
        const { key, isComplete } = signature(v, this[side].problem.linear[v]!, this.edges[side], marks)
        const group = bySignature.get(key) ?? { before: [], after: [], isComplete }
        bySignature.set(key, group)
        group[side].push(v)
      }
    }
    collect('before', this.places)
    collect('after', this.marks)
    let matched = 0
    for (const { before, after, isComplete } of bySignature.values()) {
      // Variables that agree in everything, all of it matched, are interchangeable: their order decides.
      if (before.length !== after.length || (before.length > 1 && !isComplete)) continue
      before.forEach((i, k) => this.set(i, after[k]!))
      matched += before.length
    }
    return matched
  }

  private agrees(i: number): boolean {
    const j = this.places[i]!
    if (this.before.problem.linear[i] !== this.after.problem.linear[j]) return false
    const [was, is] = [this.edges.before, this.edges.after]
    if (was.offsets[i + 1]! - was.offsets[i]! !== is.offsets[j + 1]! - is.offsets[j]!) return false
    const values = new Map<number, number>()
    for (let p = is.offsets[j]!; p < is.offsets[j + 1]!; p++) values.set(is.targets[p]!, is.values[p]!)
    for (let p = was.offsets[i]!; p < was.offsets[i + 1]!; p++) {
      const place = this.places[was.targets[p]!]!
      if (place < 0 || values.get(place) !== was.values[p]) return false
    }
    return true
  }

  /** Takes back every guess that does not hold, and those that rested on it. */
  check(guessed: readonly number[]): void {
    for (let wrong = [...guessed]; wrong.length > 0;) {
      wrong = guessed.filter((i) => this.places[i]! >= 0 && !this.agrees(i))
      for (const i of wrong) {
        this.marks[this.places[i]!] = -1
        this.places[i] = -1
      }
    }
  }

  guess(): void {
    const unnamed = unmarked(this.places)
    const most = Math.max(unnamed.length, unmarked(this.marks).length)
    if (unnamed.length === 0 || most > DEFAULTS.maxUnmatched) return
    for (let round = 0; round < DEFAULTS.maxRounds; round++) if (this.round() === 0) break
    this.check(unnamed)
  }
}

/**
 * The index in `after` of every variable of `before`, or −1 where it is gone.
 * O(interactions) for equal labels; each round of guessing is O(interactions of the variables with new labels).
 */
export function matchVariables(before: NamedProblem, after: NamedProblem): Int32Array {
  const matching = new Matching(before, after)
  const places = new Map(after.labels.map((label, j) => [label, j]))
  before.labels.forEach((label, i) => {
    const j = places.get(label)
    if (j !== undefined) matching.set(i, j)
  })
  const isInPlace = matching.places.every((j, i) => j < 0 || j === i)
  if (isInPlace && agreeByPlace(before.problem, after.problem)) return Int32Array.from(after.labels.keys())
  matching.guess()
  return matching.places
}
