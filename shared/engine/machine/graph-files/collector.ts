import { groupDigits } from '../../digits'
import { ReadingFault } from '../../formats/format'
import type { ReadingIssue } from '../../formats/format'
import { graphFromEdges } from '../../graph/build'
import { FAMILY_LIMITS } from '../family'
import { LARGEST_NUMBER } from './graph-file'
import type { ReadGraph } from './graph-file'

const KEPT_ISSUES = 100

/** Where a qubit or coupler stands, as its reader counts: a line, or a place in a list. */
export type Told = (what: 'qubit' | 'coupler', at: number) => { readonly line?: number; readonly place?: string }

/** The first repeats are named; all are counted. */
interface Repeat {
  readonly a: number
  readonly b: number
  readonly first: number
  readonly again: number
}

/** Gathers qubits and couplers from a reader and checks them: every format has the same rules. */
export class GraphCollector {
  readonly issues: ReadingIssue[] = []
  issueCount = 0
  /** Whether each coupler may be stated once in each direction. */
  isDirected = false
  private refusedQubits = 0
  private readonly numbers: number[] = []
  private readonly numberAt: number[] = []
  private readonly places: number[] = []
  private readonly couplerEnds: number[] = []
  private readonly couplerAt: number[] = []

  /**
   * @param listsQubits whether the file lists its qubits, so that couplers of others are wrong
   */
  constructor(
    private readonly listsQubits: boolean,
    private readonly told: Told,
  ) {}

  /** Notes what is wrong; a place without line numbers becomes part of the message. */
  reject(what: 'qubit' | 'coupler', at: number, message: string): void {
    this.issueCount++
    if (what === 'qubit') this.refusedQubits++
    if (this.issues.length >= KEPT_ISSUES) return
    const { line, place } = this.told(what, at)
    const text = place === undefined ? message : `${place}: ${message}`
    this.issues.push(line === undefined ? { message: text } : { line, message: text })
  }

  /** Notes what is wrong with the file as a whole. */
  fail(message: string, line?: number): void {
    this.issueCount++
    if (this.issues.length < KEPT_ISSUES) this.issues.push(line === undefined ? { message } : { line, message })
  }

  /**
   * @param x NaN for a qubit without a position
   * @throws ReadingFault beyond the most qubits
   */
  addQubit(number: number, at: number, x = Number.NaN, y = Number.NaN): void {
    if (this.numbers.length >= FAMILY_LIMITS.qubits)
      throw new ReadingFault(`there are more than the ${groupDigits(FAMILY_LIMITS.qubits)} qubits that are possible`)
    this.numbers.push(number)
    this.numberAt.push(at)
    this.places.push(x, y)
  }

  /** @throws ReadingFault beyond the most couplers */
  addCoupler(a: number, b: number, at: number): void {
    if (a === b) return this.reject('coupler', at, `qubit ${a} is coupled to itself`)
    if (this.couplerAt.length >= FAMILY_LIMITS.couplers * (this.isDirected ? 2 : 1))
      throw new ReadingFault(
        `there are more than the ${groupDigits(FAMILY_LIMITS.couplers)} couplers that are possible`,
      )
    this.couplerEnds.push(a, b)
    this.couplerAt.push(at)
  }

  /** The graph, or null where anything is wrong. */
  finish(): ReadGraph | null {
    const ids = this.sortedNumbers()
    if (this.issueCount === 0 && ids.length === 0) this.fail('the file holds no qubits')
    if (ids.length > FAMILY_LIMITS.qubits)
      this.fail(
        `there are ${groupDigits(ids.length)} qubits; at most ${groupDigits(FAMILY_LIMITS.qubits)} are possible`,
      )
    const indices = new Map<number, number>()
    ids.forEach((id, index) => indices.set(id, index))
    this.refuseRepeats()
    // Where a qubit was refused, couplers of it would only be refused for the same reason.
    const ends = this.refusedQubits === 0 ? this.denseEnds(indices) : new Float64Array(0)
    const positions = this.issueCount === 0 ? this.sortedPlaces(indices) : null
    if (this.issueCount > 0) return this.inOrder()
    const graph = graphFromEdges(ids.length, ends)
    if (graph.ends.length / 2 > FAMILY_LIMITS.couplers)
      this.fail(
        `there are ${groupDigits(graph.ends.length / 2)} couplers; at most ${groupDigits(FAMILY_LIMITS.couplers)} are possible`,
      )
    return this.issueCount > 0 ? null : { ids, ends: graph.ends, positions }
  }

  /** What was found in several passes, as it stands in the file. */
  private inOrder(): null {
    this.issues.sort((a, b) => (a.line ?? 0) - (b.line ?? 0))
    return null
  }

  private sortedNumbers(): Uint32Array {
    const stated = Uint32Array.from(this.numbers)
    const ends = this.listsQubits ? new Uint32Array(0) : Uint32Array.from(this.couplerEnds)
    const all = new Uint32Array(stated.length + ends.length)
    all.set(stated)
    all.set(ends, stated.length)
    all.sort()
    let kept = 0
    for (let k = 0; k < all.length; k++) if (k === 0 || all[k] !== all[k - 1]) all[kept++] = all[k]!
    if (this.listsQubits && kept < stated.length) this.refuseRepeatedQubits()
    return all.slice(0, kept)
  }

  private refuseRepeatedQubits(): void {
    const seen = new Set<number>()
    this.numbers.forEach((number, k) => {
      if (seen.has(number)) this.reject('qubit', this.numberAt[k]!, `qubit ${number} is listed again`)
      seen.add(number)
    })
  }

  private denseEnds(indices: ReadonlyMap<number, number>): Float64Array {
    const ends = new Float64Array(this.couplerEnds.length)
    this.couplerEnds.forEach((number, slot) => {
      const index = indices.get(number)
      if (index === undefined)
        this.reject(
          'coupler',
          this.couplerAt[slot >> 1]!,
          `qubit ${number} is not among the qubits that the file lists`,
        )
      else ends[slot] = index
    })
    return ends
  }

  /** Pairs of couplers are told apart by direction where each direction may stand once. */
  private refuseRepeats(): void {
    const order = LARGEST_NUMBER + 1
    const keyOf = (k: number): number => {
      const [a, b] = [this.couplerEnds[2 * k]!, this.couplerEnds[2 * k + 1]!]
      return a < b || this.isDirected ? a * order + b : b * order + a
    }
    const keys = Float64Array.from({ length: this.couplerAt.length }, (_, k) => keyOf(k)).sort()
    let repeats = 0
    for (let k = 1; k < keys.length; k++) if (keys[k] === keys[k - 1]) repeats++
    if (repeats > 0) for (const repeat of this.repeatsAmong(keyOf)) this.tellRepeat(repeat)
  }

  private *repeatsAmong(keyOf: (k: number) => number): Generator<Repeat> {
    const firstOf = new Map<number, number>()
    for (let k = 0; k < this.couplerAt.length; k++) {
      const key = keyOf(k)
      const first = firstOf.get(key)
      if (first === undefined) firstOf.set(key, k)
      else yield { a: this.couplerEnds[2 * k]!, b: this.couplerEnds[2 * k + 1]!, first, again: k }
    }
  }

  private tellRepeat({ a, b, first, again }: Repeat): void {
    const { line, place } = this.told('coupler', this.couplerAt[first]!)
    const where = line === undefined ? place : `line ${line}`
    this.reject('coupler', this.couplerAt[again]!, `coupler ${a}-${b} is listed again, after ${where}`)
  }

  private sortedPlaces(indices: ReadonlyMap<number, number>): Float64Array | null {
    const placed = this.numbers.filter((_, k) => !Number.isNaN(this.places[2 * k]!)).length
    if (placed === 0) return null
    if (placed < indices.size) {
      const bare = this.numbers.findIndex((_, k) => Number.isNaN(this.places[2 * k]!))
      const missing = `${groupDigits(indices.size - placed)} of ${groupDigits(indices.size)} qubits have no position`
      this.reject('qubit', this.numberAt[bare]!, `${missing}, qubit ${this.numbers[bare]} first: give all or none`)
      return null
    }
    const positions = new Float64Array(2 * indices.size)
    const taken = new Map<string, number>()
    this.numbers.forEach((number, k) => {
      const [x, y] = [this.places[2 * k]!, this.places[2 * k + 1]!]
      const other = taken.get(`${x},${y}`)
      if (other !== undefined)
        this.reject('qubit', this.numberAt[k]!, `qubit ${number} lies where qubit ${other} does, at (${x}, ${y})`)
      taken.set(`${x},${y}`, number)
      positions.set([x, y], 2 * indices.get(number)!)
    })
    return positions
  }
}
