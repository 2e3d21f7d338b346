import type { Canvas2D } from './paint-edges'

/** Outlines that the lattice, its legend and its saved pictures draw alike. Each adds to the path that is begun. */

export function traceDiamond(ctx: Canvas2D, x: number, y: number, arm: number): void {
  ctx.moveTo(x, y - arm)
  ctx.lineTo(x + arm, y)
  ctx.lineTo(x, y + arm)
  ctx.lineTo(x - arm, y)
  ctx.closePath()
}

/** An equilateral triangle within a circle of the given radius. */
export function traceTriangle(ctx: Canvas2D, x: number, y: number, radius: number, points: 'up' | 'down'): void {
  const tip = points === 'up' ? -radius : radius
  ctx.moveTo(x, y + tip)
  ctx.lineTo(x + 0.866 * radius, y - tip / 2)
  ctx.lineTo(x - 0.866 * radius, y - tip / 2)
  ctx.closePath()
}

/** A level band with round ends, their middles at `from` and `to`. */
export function traceBand(ctx: Canvas2D, from: number, to: number, y: number, radius: number): void {
  ctx.moveTo(from, y + radius)
  ctx.arc(from, y, radius, Math.PI / 2, 1.5 * Math.PI)
  ctx.lineTo(to, y - radius)
  ctx.arc(to, y, radius, -Math.PI / 2, Math.PI / 2)
  ctx.closePath()
}
