import { graphFromEdges } from '../../graph/build'
import type { Fabric } from '../fabric'

/** A neighbour's place relative to a point: columns to the right, rows down. */
export type Step = readonly [dx: number, dy: number]

/** The size fields of a rectangle of points. */
export const RECTANGLE_SIZES = [
  { field: 'width', least: 1 },
  { field: 'height', least: 1 },
] as const

/**
 * A rectangle of points one apart, numbered row by row from 0 (y·width + x), each joined to the points at `steps`.
 * Give one of each pair of opposite steps.
 */
export function buildPoints(width: number, height: number, steps: readonly Step[]): Omit<Fabric, 'family'> {
  const order = width * height
  const segments = new Float32Array(4 * order)
  const ends: number[] = []
  for (let y = 0, q = 0; y < height; y++)
    for (let x = 0; x < width; x++, q++) {
      segments.set([x, y, x, y], 4 * q)
      for (const [dx, dy] of steps) {
        if (x + dx < 0 || x + dx >= width || y + dy < 0 || y + dy >= height) continue
        ends.push(q, q + dy * width + dx)
      }
    }
  return { graph: graphFromEdges(order, ends), ids: Uint32Array.from({ length: order }, (_, q) => q), segments }
}
