import { buildProblem } from '../build'
import type { Form, Problem } from '../problem'
import { commonUnit, isExact, toInteger, toNumber } from './dyadic'

/** Spin coefficients from bit coefficients have quarters: two binary places more. */
const QUARTER = 2

/**
 * A QUBO that variables are taken out of, with integer coefficients in units of 2^unit, so that nothing is ever rounded.
 * Variables whose coefficients changed stand in a queue, each at most once, until they are taken from it.
 */
export class WorkingProblem {
  readonly n: number
  readonly unit: number
  readonly linear: bigint[]
  /** pairs[i].get(j) is the interaction of i and j, never zero; kept at both. */
  readonly pairs: Map<number, bigint>[]
  /** Sums of the negative and of the positive interactions at each variable. */
  readonly below: bigint[]
  readonly above: bigint[]
  readonly isLeft: Uint8Array
  constant: bigint
  /** Variables still there. */
  left: number
  private queue: number[] = []
  private head = 0
  private readonly isQueued: Uint8Array

  /** The QUBO form of a problem in either form; see convert.ts for the substitution. O(n + interactions). */
  constructor(problem: Problem, form: Form) {
    const { n, linear, rows, cols, values, offset } = problem
    this.n = n
    this.left = n
    this.unit = commonUnit([linear, values, [offset]])
    this.linear = Array.from(linear, (value) => toInteger(value, this.unit))
    this.pairs = Array.from({ length: n }, () => new Map<number, bigint>())
    this.below = new Array<bigint>(n).fill(0n)
    this.above = new Array<bigint>(n).fill(0n)
    this.isLeft = new Uint8Array(n).fill(1)
    this.isQueued = new Uint8Array(n)
    this.constant = toInteger(offset, this.unit)
    if (form === 'ising') {
      for (const h of this.linear) this.constant -= h
      this.linear = this.linear.map((h) => 2n * h)
    }
    for (let k = 0; k < values.length; k++) {
      const value = toInteger(values[k]!, this.unit)
      if (form === 'qubo') this.addPair(rows[k]!, cols[k]!, value)
      else this.addSpinPair(rows[k]!, cols[k]!, value)
    }
    for (let v = 0; v < n; v++) this.touch(v)
  }

  private addSpinPair(i: number, j: number, coupling: bigint): void {
    this.addPair(i, j, 4n * coupling)
    this.linear[i]! -= 2n * coupling
    this.linear[j]! -= 2n * coupling
    this.constant += coupling
  }

  /** The next variable whose coefficients changed, or −1. */
  next(): number {
    while (this.head < this.queue.length) {
      const v = this.queue[this.head++]!
      this.isQueued[v] = 0
      if (this.isLeft[v] === 1) return v
    }
    this.queue = []
    this.head = 0
    return -1
  }

  private touch(v: number): void {
    if (this.isQueued[v] === 1) return
    this.isQueued[v] = 1
    this.queue.push(v)
  }

  addLinear(v: number, amount: bigint): void {
    this.linear[v]! += amount
    this.touch(v)
  }

  addPair(i: number, j: number, amount: bigint): void {
    const before = this.pairs[i]!.get(j) ?? 0n
    this.setHalf(i, j, before, before + amount)
    this.setHalf(j, i, before, before + amount)
  }

  private setHalf(i: number, j: number, before: bigint, after: bigint): void {
    if (before < 0n) this.below[i]! -= before
    else this.above[i]! -= before
    if (after < 0n) this.below[i]! += after
    else this.above[i]! += after
    if (after === 0n) this.pairs[i]!.delete(j)
    else this.pairs[i]!.set(j, after)
    this.touch(i)
  }

  /** Takes a variable out that has no interactions left to others. */
  private drop(v: number): void {
    this.linear[v] = 0n
    this.isLeft[v] = 0
    this.left--
  }

  private detach(v: number): [number, bigint][] {
    const partners = [...this.pairs[v]!]
    for (const [j, value] of partners) this.addPair(v, j, -value)
    return partners
  }

  /** Sets a variable to 0 or 1. */
  assign(v: number, value: 0 | 1): void {
    const partners = this.detach(v)
    if (value === 1) {
      this.constant += this.linear[v]!
      for (const [j, pair] of partners) this.addLinear(j, pair)
    }
    this.drop(v)
  }

  /** Puts x_u, or 1 − x_u, for x_v. */
  identify(v: number, u: number, isOpposite: boolean): void {
    const a = this.linear[v]!
    const partners = this.detach(v)
    for (const [j, pair] of partners) {
      if (j === u) {
        // x_u (1 − x_u) = 0, x_u² = x_u
        if (!isOpposite) this.addLinear(u, pair)
      } else if (isOpposite) {
        this.addLinear(j, pair)
        this.addPair(u, j, -pair)
      } else this.addPair(u, j, pair)
    }
    if (isOpposite) this.constant += a
    this.addLinear(u, isOpposite ? -a : a)
    this.drop(v)
  }

  /**
   * Puts min over x_v for a variable with exactly two interactions, b to y and c to z: f(y, z) = min(0, a + b y + c z)
   * is a quadratic in y and z.
   */
  fold(v: number): void {
    const a = this.linear[v]!
    const [[y, b], [z, c]] = this.detach(v) as [[number, bigint], [number, bigint]]
    const f = (sum: bigint): bigint => (sum < 0n ? sum : 0n)
    const none = f(a)
    const atY = f(a + b)
    const atZ = f(a + c)
    this.constant += none
    this.addLinear(y, atY - none)
    this.addLinear(z, atZ - none)
    this.addPair(y, z, f(a + b + c) - atY - atZ + none)
    this.drop(v)
  }

  /**
   * What is left, in the form asked for, over the variables left in ascending order. Each coefficient is the exact value
   * rounded once; `isExact` says that none had to be rounded.
   * @throws RangeError when a coefficient overflows, or an interaction underflows to zero
   */
  toProblem(form: Form): { problem: Problem; kept: Uint32Array; isExact: boolean } {
    const kept = Uint32Array.from(this.isLeft.keys()).filter((v) => this.isLeft[v] === 1)
    const place = new Uint32Array(this.n)
    kept.forEach((v, k) => (place[v] = k))
    const unit = form === 'qubo' ? this.unit : this.unit - QUARTER
    const rows: number[] = []
    const cols: number[] = []
    const values: number[] = []
    let exact = true
    const add = (row: number, col: number, integer: bigint): void => {
      rows.push(row)
      cols.push(col)
      values.push(toNumber(integer, unit))
      exact &&= isExact(integer, unit)
    }
    let constant = form === 'qubo' ? this.constant : 4n * this.constant
    for (const v of kept) {
      const a = this.linear[v]!
      const field = 2n * a + this.below[v]! + this.above[v]!
      if (form === 'ising') constant += 2n * a
      add(place[v]!, place[v]!, form === 'qubo' ? a : field)
      for (const [j, b] of this.pairs[v]!) {
        if (j < v) continue
        if (form === 'ising') constant += b
        add(place[v]!, place[j]!, b)
      }
    }
    exact &&= isExact(constant, unit)
    const built = buildProblem(kept.length, { rows, cols, values }, toNumber(constant, unit))
    if (built.zerosDropped > 0) throw new RangeError('an interaction of the reduced problem underflows to zero')
    return { problem: built.problem, kept, isExact: exact }
  }
}
