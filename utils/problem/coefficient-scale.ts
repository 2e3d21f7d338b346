import { mixColours } from '../lattice/tokens'
import type { Tokens } from '../lattice/tokens'

/**
 * A diverging scale for coefficients: zero in the middle, the same to both sides, in steps rather than shades, so that
 * the legend can name each. Sign is told by line and mark as well (negative solid and filled, positive dashed and
 * hollow), size by width as well; colour alone carries nothing.
 */
export interface CoefficientScale {
  /** Upper ends of the steps by size, ascending; the last is the largest coefficient. Empty where all are nought. */
  readonly bounds: readonly number[]
}

export const SCALE_DEFAULTS = {
  steps: 4,
  /** Largest over median size from which steps grow by a factor instead of being equal. */
  wideFrom: 8,
  wideFactor: 4,
}

/** Blue and olive lie apart for normal and for deficient colour vision, and neither is near the clay of breaks. */
export const POLES = {
  light: { negative: '#1d4fa8', positive: '#80690a' },
  dark: { negative: '#86aeff', positive: '#e8c558' },
} as const

export function scaleOf(values: ArrayLike<number>): CoefficientScale {
  const sizes = Array.from(values, Math.abs)
    .filter((size) => size > 0)
    .sort((a, b) => a - b)
  const largest = sizes.at(-1)
  if (largest === undefined) return { bounds: [] }
  const { steps, wideFrom, wideFactor } = SCALE_DEFAULTS
  const median = sizes[(sizes.length - 1) >> 1]!
  if (sizes[0] === largest) return { bounds: [largest] }
  const ends = Array.from({ length: steps }, (_, step) =>
    largest / median > wideFrom ? largest * wideFactor ** (step + 1 - steps) : (largest * (step + 1)) / steps,
  )
  return { bounds: [...ends.slice(0, -1), largest] }
}

/** Step of a coefficient: 0 for nought, else 1 … number of steps with the sign of the coefficient. */
export function stepOf({ bounds }: CoefficientScale, value: number): number {
  if (value === 0 || bounds.length === 0) return 0
  const size = Math.abs(value)
  const found = bounds.findIndex((bound) => size <= bound * (1 + 1e-12))
  const step = (found < 0 ? bounds.length - 1 : found) + 1
  return value < 0 ? -step : step
}

/** Share of the way to the largest step, 0 … 1. */
export const weightOfStep = ({ bounds }: CoefficientScale, step: number): number =>
  bounds.length === 0 ? 0 : Math.abs(step) / bounds.length

export function colourOfStep(scale: CoefficientScale, step: number, tokens: Pick<Tokens, 'edge' | 'isDark'>): string {
  if (step === 0) return tokens.edge
  const pole = POLES[tokens.isDark ? 'dark' : 'light'][step < 0 ? 'negative' : 'positive']
  return mixColours(tokens.edge, pole, weightOfStep(scale, step))
}

/** Width of an interaction's line, in pixels. */
export const widthOfStep = (scale: CoefficientScale, step: number): number => 0.8 + 2 * weightOfStep(scale, step)

/** Radius of a variable's mark, in pixels, before the drawing shrinks those of large problems. */
export const radiusOfStep = (scale: CoefficientScale, step: number): number => 3.5 + 4.5 * weightOfStep(scale, step)

/** All steps from the most negative to the most positive that some value falls in, with how many do. */
export function countSteps(scale: CoefficientScale, values: ArrayLike<number>): { step: number; count: number }[] {
  const counts = new Map<number, number>()
  for (let k = 0; k < values.length; k++) {
    const step = stepOf(scale, values[k]!)
    counts.set(step, (counts.get(step) ?? 0) + 1)
  }
  return [...counts].map(([step, count]) => ({ step, count })).sort((a, b) => a.step - b.step)
}
