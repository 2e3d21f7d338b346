import type { Canvas2D } from './paint-edges'
import type { SceneNode } from './scene-types'
import { traceTriangle } from './shapes'
import type { Tokens } from './tokens'
import type { View } from './types'

/** Radius in pixels up to which a disc is painted as a square, which takes a tenth of the time and looks the same. */
const LEAST_ROUND = 1.6

/**
 * Paints marks, those that look alike at once: paper around, rim, fill. What looks different lies over what came first.
 *
 * @param most largest radius in pixels, so that marks of neighbouring qubits stay apart when seen from afar
 */
export function paintMarks(
  ctx: Canvas2D,
  nodes: readonly SceneNode[],
  view: View,
  bandPixels: number,
  most: number,
  tokens: Tokens,
): void {
  for (const group of groupsOf(nodes)) {
    const { color, rim, rimWidth, halo } = group[0]!
    const radius = ({ size }: SceneNode) => Math.min(most, size * bandPixels)
    if (halo > 0 && most > LEAST_ROUND) fill(ctx, group, view, radius, tokens.paper)
    if (rimWidth > 0) fill(ctx, group, view, (node) => radius(node) - halo, rim)
    fill(ctx, group, view, (node) => Math.max(Math.min(0.8, radius(node)), radius(node) - halo - rimWidth), color)
  }
}

function groupsOf(nodes: readonly SceneNode[]): Iterable<SceneNode[]> {
  const groups = new Map<string, SceneNode[]>()
  for (const node of nodes) {
    const look = `${node.color} ${node.rim} ${node.rimWidth} ${node.halo}`
    const group = groups.get(look)
    if (group) group.push(node)
    else groups.set(look, [node])
  }
  return groups.values()
}

function fill(
  ctx: Canvas2D,
  nodes: readonly SceneNode[],
  { scale, x, y }: View,
  radiusOf: (node: SceneNode) => number,
  colour: string,
): void {
  ctx.fillStyle = colour
  for (const node of nodes) fillMark(ctx, node.shape, x + scale * node.x, y + scale * node.y, radiusOf(node))
}

/** Each mark by itself: one path of thousands of shapes takes a rasteriser many times as long. */
function fillMark(ctx: Canvas2D, shape: SceneNode['shape'], x: number, y: number, radius: number): void {
  const half = shape === 'square' ? radius * Math.SQRT1_2 : 0.9 * radius
  if (shape === 'square' || (shape === 'circle' && radius < LEAST_ROUND))
    return ctx.fillRect(x - half, y - half, 2 * half, 2 * half)
  ctx.beginPath()
  if (shape === 'circle') ctx.arc(x, y, radius, 0, 2 * Math.PI)
  else traceTriangle(ctx, x, y, radius, shape)
  ctx.fill()
}
