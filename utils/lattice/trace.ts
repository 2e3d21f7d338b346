import type { SceneEdge } from './scene-types'
import type { View } from './types'

/** What is needed of a canvas to fill shapes on it. */
export type Filler = Pick<
  CanvasRenderingContext2D,
  'beginPath' | 'moveTo' | 'lineTo' | 'arc' | 'closePath' | 'fill' | 'fillRect'
>

export const TRACE_DEFAULTS = {
  /** Half width in pixels up to which nobody sees whether an end is round. */
  leastRound: 1.9,
}

/**
 * Stretches of `from … to` that are left when `reach` on both sides of every gap is taken out, ascending. Gaps are
 * ascending too.
 */
export function stretchesBetween(from: number, to: number, gaps: readonly number[], reach: number): [number, number][] {
  const stretches: [number, number][] = []
  let start = from
  for (const gap of gaps) {
    if (gap + reach <= start) continue
    if (gap - reach >= to) break
    if (gap - reach > start) stretches.push([start, gap - reach])
    start = gap + reach
  }
  if (start < to) stretches.push([start, to])
  return stretches
}

/** An edge on its way to the canvas, in pixels. */
export interface PlacedEdge {
  readonly edge: SceneEdge
  readonly x: number
  readonly y: number
  readonly dx: number
  readonly dy: number
  readonly length: number
  /** Pixels of one line spacing. */
  readonly unit: number
  /** Full width, and half of it without the half pixel that smoothing adds. */
  readonly total: number
  readonly radius: number
}

export function placeEdge(edge: SceneEdge, { scale, x, y }: View, bandPixels: number): PlacedEdge {
  const length = scale * Math.hypot(edge.x2 - edge.x1, edge.y2 - edge.y1)
  const total = Math.max(1.2, edge.size * bandPixels)
  return {
    edge,
    x: x + scale * edge.x1,
    y: y + scale * edge.y1,
    dx: length === 0 ? 1 : (scale * (edge.x2 - edge.x1)) / length,
    dy: length === 0 ? 0 : (scale * (edge.y2 - edge.y1)) / length,
    length,
    unit: scale,
    total,
    radius: Math.max(0.6, total / 2 - 0.25),
  }
}

/**
 * Fills an edge, stretch by stretch between its gaps, `half` pixels to each side. Ends are round about the same points
 * for every `half`, so that casing, outline and band lie in one another like tubes. Every stretch is filled by itself,
 * as a rectangle where it can be: one path of thousands of shapes takes a rasteriser many times as long.
 *
 * @param limits part of the edge to fill, in pixels along it; its ends are then cut straight
 */
export function fillEdge(
  ctx: Filler,
  placed: PlacedEdge,
  half: number,
  limits: readonly [number, number] | null = null,
): void {
  if (half <= 0) return
  const { edge, length, unit, radius } = placed
  const round = edge.caps > 0 && limits === null && radius > TRACE_DEFAULTS.leastRound
  const inset = round ? Math.min(radius, length / 2) : 0
  const [from, to] = limits ?? [inset, length - inset]
  if (edge.gaps.length === 0) return fillPiece(ctx, placed, half, from, to, round, round)
  const gaps = edge.gaps.map((line) => (line - edge.from) * unit)
  for (const [start, end] of stretchesBetween(from, to, gaps, radius))
    fillPiece(ctx, placed, half, start, end, round && start === from, round && end === to)
}

function fillPiece(
  ctx: Filler,
  { x, y, dx, dy }: PlacedEdge,
  half: number,
  from: number,
  to: number,
  roundStart: boolean,
  roundEnd: boolean,
): void {
  const [sx, sy, ex, ey] = [x + from * dx, y + from * dy, x + to * dx, y + to * dy]
  if (!roundStart && !roundEnd && (dx === 0 || dy === 0)) {
    const [acrossX, acrossY] = dy === 0 ? [0, half] : [half, 0]
    return ctx.fillRect(
      Math.min(sx, ex) - acrossX,
      Math.min(sy, ey) - acrossY,
      Math.abs(ex - sx) + 2 * acrossX,
      Math.abs(ey - sy) + 2 * acrossY,
    )
  }
  const angle = Math.atan2(dy, dx)
  ctx.beginPath()
  ctx.moveTo(sx - half * dy, sy + half * dx)
  if (roundStart) ctx.arc(sx, sy, half, angle + Math.PI / 2, angle + 1.5 * Math.PI)
  else ctx.lineTo(sx + half * dy, sy - half * dx)
  ctx.lineTo(ex + half * dy, ey - half * dx)
  if (roundEnd) ctx.arc(ex, ey, half, angle - Math.PI / 2, angle + Math.PI / 2)
  else ctx.lineTo(ex - half * dy, ey + half * dx)
  ctx.closePath()
  ctx.fill()
}
