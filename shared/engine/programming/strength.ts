import type { Problem } from '../problem/problem'
import { cutBoundsOf } from './cut-bounds'
import { layOut } from './layout'
import type { Layout, LayoutInput } from './layout'

export { cutBounds } from './cut-bounds'

/**
 * How chain strengths are chosen (docs/formulas.md, From embedding to programmed values):
 * - fixed: `value` × max|J|, or × max|h| when there is no interaction;
 * - rms: `value` (κ) × J_rms × √(mean degree): neighbours pull at random, so their sum grows with √degree;
 * - choi: per chain Σ_j|J_ij| − |h_i|, times the margin `value` (≥ 1). Sufficient when the field is split by external
 *   coupling, or is zero; with an even split of a field it can be too weak, the cut bound is not;
 * - cut: per chain the cut bound, times the margin `value` (≥ 1);
 * - manual: `value` in logical units, overridden for chain i where `perChain[i]` is a number.
 */
export type StrengthRule =
  | { readonly rule: 'fixed'; readonly value: number }
  | { readonly rule: 'rms'; readonly value: number }
  | { readonly rule: 'choi'; readonly value?: number }
  | { readonly rule: 'cut'; readonly value?: number }
  | { readonly rule: 'manual'; readonly value: number; readonly perChain?: ArrayLike<number | null | undefined> }

/** `margin`: the bounds are strict. `leastShare`: of max|J|, so that a chain that needs nothing still holds together. */
export const STRENGTH_DEFAULTS = { margin: 1.05, leastShare: 0.05 }

export interface ChainStrengths {
  /** Per variable, in logical units, ≥ 0. Chains of one qubit have no chain coupler: their value has no effect. */
  readonly perChain: Float64Array
  readonly summary: {
    readonly rule: StrengthRule['rule']
    /** Least, mean and greatest strength over chains of two or more qubits; 0 when there is none. */
    readonly least: number
    readonly mean: number
    readonly greatest: number
    /** Chains of two or more qubits. */
    readonly chains: number
    /** Chains whose cut bound is a safe upper bound only (rule cut). */
    readonly inexactBounds: number
    /** Chains raised to the least share of max|J| (rules choi and cut). */
    readonly raisedToLeast: number
  }
}

const greatestSize = (values: Float64Array): number => values.reduce((most, v) => Math.max(most, Math.abs(v)), 0)

/** max|J|, or max|h| when there is no interaction: the size that chain strengths are compared with. */
export function referenceSize(ising: Problem): number {
  return ising.values.length > 0 ? greatestSize(ising.values) : greatestSize(ising.linear)
}

/** J_rms over the interactions; 0 when there is none. */
export function rmsCoupling({ values }: Problem): number {
  return values.length === 0 ? 0 : Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length)
}

/** κ = 1 of the root-mean-square rule: J_rms·√(mean degree), or max|h| when there is no interaction. */
export function rmsSize(ising: Problem): number {
  const m = ising.values.length
  if (m === 0) return referenceSize(ising)
  return rmsCoupling(ising) * Math.sqrt((2 * m) / ising.n)
}

/** Σ_j|J_ij| of every variable: how hard its partners can pull together. */
export function pullsOf(ising: Problem): Float64Array {
  const pull = new Float64Array(ising.n)
  ising.values.forEach((v, k) => {
    pull[ising.rows[k]!]! += Math.abs(v)
    pull[ising.cols[k]!]! += Math.abs(v)
  })
  return pull
}

/** Choi's bound per variable, max(0, Σ_j|J_ij| − |h_i|), in logical units (Choi, arXiv:0804.4884, 2008). */
export function choiBounds(ising: Problem): Float64Array {
  return pullsOf(ising).map((sum, i) => Math.max(0, sum - Math.abs(ising.linear[i]!)))
}

function requireAtLeast(value: number, least: number, what: string): number {
  if (!(Number.isFinite(value) && value >= least))
    throw new RangeError(`${what} must be at least ${least}, not ${value}`)
  return value
}

function manualStrengths(n: number, rule: Extract<StrengthRule, { rule: 'manual' }>): Float64Array {
  const { value, perChain } = rule
  if (perChain && perChain.length !== n) throw new RangeError(`${perChain.length} chain strengths for ${n} chains`)
  return Float64Array.from({ length: n }, (_, i) => {
    const own = perChain?.[i]
    const chosen = own === null || own === undefined || Number.isNaN(own) ? value : own
    return requireAtLeast(chosen, 0, `the strength of chain ${i}`)
  })
}

/**
 * Chain strengths by one rule.
 * @throws RangeError for a negative or non-finite value, a margin below 1, a wrong number of strengths, or an embedding that
 *   does not fit problem and machine
 */
export function chainStrengths(rule: StrengthRule, input: LayoutInput): ChainStrengths {
  return chainStrengthsOf(rule, layOut(input), input.ising)
}

/** The same for a problem that is laid out already. */
export function chainStrengthsOf(rule: StrengthRule, layout: Layout, ising: Problem): ChainStrengths {
  const isChain = (i: number): boolean => layout.chainLength[i]! > 1
  const uniform = (k: number): Float64Array => new Float64Array(ising.n).fill(k)
  let inexactBounds = 0
  let raisedToLeast = 0
  const least = STRENGTH_DEFAULTS.leastShare * referenceSize(ising)
  const aboveBounds = (bounds: Float64Array, margin = STRENGTH_DEFAULTS.margin): Float64Array => {
    requireAtLeast(margin, 1, 'the margin')
    return bounds.map((bound, i) => {
      if (!isChain(i)) return 0
      if (margin * bound < least) raisedToLeast++
      return Math.max(margin * bound, least)
    })
  }
  const strengthsByRule = (): Float64Array => {
    switch (rule.rule) {
      case 'fixed':
        return uniform(requireAtLeast(rule.value, 0, 'the multiple') * referenceSize(ising))
      case 'rms':
        return uniform(requireAtLeast(rule.value, 0, 'κ') * rmsSize(ising))
      case 'choi':
        return aboveBounds(choiBounds(ising), rule.value)
      case 'cut': {
        const { bound, exact } = cutBoundsOf(layout)
        inexactBounds = exact.reduce((count, e) => count + 1 - e, 0)
        return aboveBounds(bound, rule.value)
      }
      case 'manual':
        return manualStrengths(ising.n, rule)
    }
  }
  const perChain = strengthsByRule()
  const held = perChain.filter((_, i) => isChain(i))
  return { perChain, summary: { rule: rule.rule, ...spreadOf(held), inexactBounds, raisedToLeast } }
}

function spreadOf(held: Float64Array): { least: number; mean: number; greatest: number; chains: number } {
  if (held.length === 0) return { least: 0, mean: 0, greatest: 0, chains: 0 }
  return {
    least: held.reduce((a, b) => Math.min(a, b)),
    mean: held.reduce((a, b) => a + b, 0) / held.length,
    greatest: held.reduce((a, b) => Math.max(a, b)),
    chains: held.length,
  }
}
