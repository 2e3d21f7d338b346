import type { Problem } from '../problem/problem'
import type { ControlError } from './coefficients'
import { countDrowned } from './coefficients'
import type { CutBounds } from './cut-bounds'
import type { Layout } from './layout'
import { energyNoise } from './precision'
import type { LayoutProgramme } from './programme'
import { programmeLayout } from './programme'

/** What the run would be with every chain strength times `factor`. */
export interface StrengthEffect {
  readonly factor: number
  /** α; 0 where a chosen scale leaves the machine's ranges. */
  readonly scale: number
  /** Nonzero logical coefficients with α·|c| below 2σ, and how many there are whose kind has a control error. */
  readonly under: number
  readonly of: number
  /** What blurs the order of unbroken states, one standard deviation in logical units; Infinity at scale 0. */
  readonly noise: number
  readonly chainsBelowBound: number
}

/** Half to double, in steps that a person would try. */
export const STRENGTH_FACTORS: readonly number[] = [0.5, 0.75, 1, 1.5, 2]

/** Chains of two and more qubits whose strength is below their cut bound. */
export function chainsBelow(layout: Layout, strengths: Float64Array, { bound }: CutBounds): number {
  return strengths.reduce((count, k, i) => count + (layout.chainLength[i]! > 1 && k < bound[i]! ? 1 : 0), 0)
}

/**
 * Raising and lowering all chain strengths together: a stronger chain holds better, but may ask for a smaller α, and then
 * more coefficients drown in control error. Each factor is programmed as a run sheet with these strengths would be.
 * @param programme.strengths in logical units, as they are at factor 1
 * @throws RangeError for a factor ≤ 0, and as `programmeLayout` does
 */
export function strengthEffects(
  layout: Layout,
  ising: Problem,
  programme: LayoutProgramme,
  bounds: CutBounds,
  error: ControlError,
  factors: readonly number[] = STRENGTH_FACTORS,
): StrengthEffect[] {
  return factors.map((factor) => {
    if (!(factor > 0)) throw new RangeError(`a factor must be above 0, not ${factor}`)
    const strengths = programme.strengths.map((k) => k * factor)
    const chainsBelowBound = chainsBelow(layout, strengths, bounds)
    const { programmed } = programmeLayout(layout, ising, { ...programme, strengths })
    if (!programmed) return { factor, scale: 0, ...countDrowned(ising, 0, error), noise: Infinity, chainsBelowBound }
    const noise = energyNoise(programmed, error).ofOrder
    return { factor, scale: programmed.scale, ...countDrowned(ising, programmed.scale, error), noise, chainsBelowBound }
  })
}
