import { viewOfBox } from '../lattice/framing'
import type { View } from '../lattice/types'
import { boxOfVariables } from './graph-frame'
import { nearestVariable } from './graph-steps'

/** Size of the viewport in pixels. */
export interface Viewport {
  readonly width: number
  readonly height: number
}

export const CAMERA_DEFAULTS = {
  /** Room for labels around what is shown. */
  marginX: 44,
  marginY: 24,
  /** Distance from a mark at which the pointer still finds it. */
  reach: 14,
  /** Pixels of the unit of framed positions, at most. */
  largestScale: 4000,
}

/** The view that shows some variables, or all, with room for their labels. */
export function viewOfVariables(
  positions: Float32Array,
  { width, height }: Viewport,
  variables?: readonly number[],
): View {
  const { marginX, marginY, largestScale } = CAMERA_DEFAULTS
  const box = boxOfVariables(positions, variables)
  const inner = viewOfBox(box, width - 2 * marginX, height - 2 * marginY, 0, largestScale)
  return { scale: inner.scale, x: inner.x + marginX, y: inner.y + marginY }
}

/** The view closer by a factor, about the middle. */
export const zoomedView = ({ scale, x, y }: View, { width, height }: Viewport, by: number): View => ({
  scale: scale * by,
  x: width / 2 - by * (width / 2 - x),
  y: height / 2 - by * (height / 2 - y),
})

/** The view moved so that a variable lies in the middle; null where it is in sight already. */
export function viewWithVariable(
  view: View,
  { width, height }: Viewport,
  positions: Float32Array,
  variable: number,
): View | null {
  const x = view.x + view.scale * positions[2 * variable]!
  const y = view.y + view.scale * positions[2 * variable + 1]!
  if (x > 0 && x < width && y > 0 && y < height) return null
  return { scale: view.scale, x: view.x + width / 2 - x, y: view.y + height / 2 - y }
}

/** The variable under a pixel of the viewport; −1 where there is none. */
export function variableAtPixel(view: View, positions: Float32Array, x: number, y: number): number {
  const reach = CAMERA_DEFAULTS.reach / view.scale
  return nearestVariable(positions, (x - view.x) / view.scale, (y - view.y) / view.scale, reach)
}
