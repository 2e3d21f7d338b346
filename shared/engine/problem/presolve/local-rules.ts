/**
 * Rules that look at one variable and its neighbours. With the change of energy from x = 0 to x = 1
 *   d(x_j …) = a + Σ b_j x_j,   low = a + Σ min(0, b_j) ≤ d ≤ a + Σ max(0, b_j) = high:
 * - low ≥ 0 ⇒ x = 0 in some optimum, high ≤ 0 ⇒ x = 1 (first-order persistency: Hammer & Rudeanu, Boolean Methods in
 *   Operations Research, 1968);
 * - |b_u| ≥ max(high, −low) for one neighbour u: d has the sign of b_u while x_u = 1 and the other one while x_u = 0, so
 *   x = x_u (b_u < 0) or x = 1 − x_u (b_u > 0) in some optimum. With one neighbour this always holds, or the rule above;
 * - with two neighbours, min over x is a quadratic in them and takes the variable's place (basic algorithm of variable
 *   elimination, the same book; Crama, Hansen & Jaumard, Discrete Appl. Math. 29, 1990).
 * Each keeps the least energy, and every optimum of what is left is one of the problem before, lifted by the rule.
 */
import { toNumber } from './dyadic'
import type { Step } from './record'
import { TABLES } from './record'
import type { WorkingProblem } from './working-problem'

/** Takes one variable out if a rule allows it. */
function reduce(working: WorkingProblem, v: number): Step | null {
  const partners = working.pairs[v]!
  const a = working.linear[v]!
  const low = a + working.below[v]!
  const high = a + working.above[v]!
  if (low >= 0n || high <= 0n) {
    const value = low >= 0n ? 0 : 1
    const rule = partners.size === 0 ? 'isolated' : 'sign'
    working.assign(v, value)
    const bound = toNumber(value === 0 ? low : high, working.unit)
    return { rule, variable: v, table: value === 0 ? TABLES.zero : TABLES.one, quantities: [bound] }
  }
  const ruler = rulerOf(partners, high > -low ? high : -low)
  if (ruler >= 0) return follow(working, v, ruler, low, high)
  return partners.size === 2 ? fold(working, v) : null
}

/** The neighbour with the largest interaction, the lowest of equal ones, if that reaches `least`; else −1. */
function rulerOf(partners: ReadonlyMap<number, bigint>, least: bigint): number {
  let found = -1
  let largest = least
  for (const [j, value] of partners) {
    const size = value < 0n ? -value : value
    if (size < largest || (size === largest && found >= 0 && j > found)) continue
    found = j
    largest = size
  }
  return found
}

function follow(working: WorkingProblem, v: number, u: number, low: bigint, high: bigint): Step {
  const b = working.pairs[v]!.get(u)!
  const isOpposite = b > 0n
  const rule = working.pairs[v]!.size === 1 ? 'leaf' : 'follow'
  const atZero = isOpposite ? high - b : low - b
  const atOne = isOpposite ? low + b : high + b
  working.identify(v, u, isOpposite)
  return {
    rule,
    variable: v,
    first: u,
    table: isOpposite ? TABLES.opposite : TABLES.same,
    quantities: [toNumber(atZero, working.unit), toNumber(atOne, working.unit)],
  }
}

function fold(working: WorkingProblem, v: number): Step {
  const a = working.linear[v]!
  const [[first, b], [second, c]] = [...working.pairs[v]!] as [[number, bigint], [number, bigint]]
  let table = 0
  const sums = [a, a + b, a + c, a + b + c]
  sums.forEach((sum, bit) => (table |= sum < 0n ? 1 << bit : 0))
  const quantities = [a, b, c].map((value) => toNumber(value, working.unit))
  working.fold(v)
  return { rule: 'fold', variable: v, first, second, table, quantities }
}

/** How many variables are looked at between two questions whether to stop. */
const BREATH = 1024

/** Applies the rules until none fits, or until asked to stop. Each step is added to `steps`. */
export function applyLocalRules(working: WorkingProblem, steps: Step[], shouldStop: () => boolean): void {
  let looked = 0
  for (let v = working.next(); v >= 0; v = working.next()) {
    const step = reduce(working, v)
    if (step) steps.push(step)
    if (++looked % BREATH === 0 && shouldStop()) return
  }
}
