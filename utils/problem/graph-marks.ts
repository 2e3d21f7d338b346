import type { Tokens } from '../lattice/tokens'
import { colourOfStep, radiusOfStep } from './coefficient-scale'
import type { CoefficientScale } from './coefficient-scale'
import type { GraphMark } from './graph-drawing'

/** What the marks of the variables tell. */
export interface MarksInput {
  readonly positions: Float32Array
  /** Step of each variable's linear coefficient. */
  readonly steps: Int8Array
  readonly scale: CoefficientScale
  readonly tokens: Tokens
  readonly focused: number | null
  readonly hovered: number | null
  readonly selected: ReadonlySet<number>
  /** Variables that interact with the one in focus. */
  readonly near: ReadonlySet<number>
  readonly isHidden: (variable: number) => boolean
}

/** Marks of large problems are smaller: half the size at two thousand variables. */
export const shrinkOf = (variables: number): number =>
  Math.min(1.2, Math.max(0.5, (120 / Math.max(1, variables)) ** 0.26))

/**
 * A disc for each variable: filled where its linear coefficient is negative, hollow where it is positive, a point where
 * it is nought; larger for a larger one. A ring in ink surrounds the one in focus and those selected.
 */
export function marksOf(input: MarksInput): GraphMark[] {
  const { positions, steps, scale, tokens, focused, selected, near } = input
  const shrink = shrinkOf(steps.length)
  const marks: GraphMark[] = []
  steps.forEach((step, i) => {
    if (input.isHidden(i)) return
    const isFar = focused !== null && focused !== i && !near.has(i) && !selected.has(i)
    const size = step === 0 ? 2.6 * shrink : shrink * radiusOfStep(scale, step)
    const z = i === focused ? 3 : isFar ? 0 : 1
    const at = { x: positions[2 * i]!, y: positions[2 * i + 1]! }
    const isRinged = i === focused || selected.has(i) || i === input.hovered
    if (isRinged) {
      const rimWidth = i === focused ? 2.2 : 1.5
      marks.push({ ...at, size: size + 3.5 + rimWidth, color: tokens.paper, rim: tokens.ink, rimWidth, halo: 1, z })
    }
    const colour = isFar ? tokens.rule : colourOfStep(scale, step, tokens)
    const hollow = step > 0 ? { color: tokens.paper, rim: colour, rimWidth: Math.min(2.2, 0.45 * size) } : null
    marks.push({ ...at, size, ...(hollow ?? { color: colour, rim: colour, rimWidth: 0 }), halo: isRinged ? 0 : 0.8, z })
  })
  return marks
}
