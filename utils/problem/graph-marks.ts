import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'
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

/** Variables up to which every mark follows the camera live; those of more are painted with the lines. */
export const MOST_LIVE_MARKS = 500

export const isPaintedWithLines = ({ steps }: Pick<MarksInput, 'steps'>): boolean => steps.length > MOST_LIVE_MARKS

/**
 * A disc for each variable: filled where its linear coefficient is negative, hollow where it is positive, a point where
 * it is nought; larger for a larger one. A ring in ink surrounds the one in focus and those selected.
 *
 * @param which all, or only those that stand out by focus, selection or pointer
 */
export function marksOf(input: MarksInput, which: 'all' | 'raised' = 'all'): GraphMark[] {
  const { positions, steps, tokens, focused, selected, near } = input
  const shrink = shrinkOf(steps.length)
  const marks: GraphMark[] = []
  steps.forEach((_, i) => {
    const isRinged = i === focused || selected.has(i) || i === input.hovered
    if (input.isHidden(i) || (which === 'raised' && !isRinged && !near.has(i))) return
    const isFar = focused !== null && focused !== i && !near.has(i) && !selected.has(i)
    const size = sizeOf(input, shrink, i)
    const z = i === focused ? 3 : isFar ? 0 : 1
    const at = { x: positions[2 * i]!, y: positions[2 * i + 1]! }
    if (isRinged) {
      const rimWidth = i === focused ? 2.2 : 1.5
      marks.push({ ...at, size: size + 3.5 + rimWidth, color: tokens.paper, rim: tokens.ink, rimWidth, halo: 1, z })
    }
    marks.push({ ...at, size, ...discOf(input, i, size, isFar), halo: isRinged ? 0 : 0.8, z })
  })
  return marks
}

const sizeOf = ({ steps, scale }: MarksInput, shrink: number, i: number): number =>
  steps[i] === 0 ? 2.6 * shrink : shrink * radiusOfStep(scale, steps[i]!)

function discOf({ steps, scale, tokens }: MarksInput, i: number, size: number, isFar: boolean) {
  const colour = isFar ? tokens.rule : colourOfStep(scale, steps[i]!, tokens)
  return steps[i]! > 0
    ? { color: tokens.paper, rim: colour, rimWidth: Math.min(2.2, 0.45 * size) }
    : { color: colour, rim: colour, rimWidth: 0 }
}

/** Marks painted between two pauses. */
const CHUNK = 250

/**
 * Paints the marks of all variables as they are without a focus; yields now and then, for the drawing to be spread over
 * frames.
 *
 * @param growth factor on all sizes
 */
export function* paintMarks(
  ctx: CanvasRenderingContext2D,
  input: MarksInput,
  { scale, x, y }: View,
  growth: number,
): Generator<undefined> {
  const shrink = shrinkOf(input.steps.length)
  for (let i = 0; i < input.steps.length; i++) {
    if (i % CHUNK === CHUNK - 1) yield
    if (input.isHidden(i)) continue
    const size = sizeOf(input, shrink, i)
    const { color, rim, rimWidth } = discOf(input, i, size, false)
    const px = x + scale * input.positions[2 * i]!
    const py = y + scale * input.positions[2 * i + 1]!
    for (const [radius, colour] of [
      [size, input.tokens.paper],
      [size - 0.8, rim],
      [size - 0.8 - rimWidth, color],
    ] as const) {
      ctx.fillStyle = colour
      ctx.beginPath()
      ctx.arc(px, py, growth * Math.max(0.8, radius), 0, 2 * Math.PI)
      ctx.fill()
    }
  }
}
