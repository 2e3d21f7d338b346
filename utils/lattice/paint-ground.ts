import { bandWidth } from './framing'
import { GROUND_DEFAULTS, isBare } from './ground'
import type { Ground } from './ground'
import type { Canvas2D } from './paint-edges'
import { isOfPoints } from './scene'
import { SCENE_DEFAULTS } from './scene-types'
import { paintMissing, paintPointedOut } from './paint-missing'
import type { View } from './types'

/**
 * Paints the part of the ground that falls on a canvas of the given size in pixels; yields between steps. What it shows
 * grows with the zoom: a field of qubits from afar, then dots and lines, then couplers.
 */
export function* paintGround(
  ctx: Canvas2D,
  ground: Ground,
  view: View,
  { width, height }: { readonly width: number; readonly height: number },
): Generator<void> {
  const showsFree = !ground.hiddenKinds?.has('free')
  const points = isOfPoints(ground.data)
  const isFar = view.scale < GROUND_DEFAULTS.dotsFrom
  if (showsFree && (isFar || !points)) yield* paintFabric(ctx, ground, view, { width, height })
  if (!points) paintTails(ctx, ground, view, width, height)
  yield
  if (showsFree && view.scale >= GROUND_DEFAULTS.couplersFrom) paintCouplers(ctx, ground, view, width, height)
  yield
  if (showsFree) paintDots(ctx, ground, view, width, height)
  yield
  // From afar the holes in the field tell where qubits are missing: squares around them would be all that one sees.
  if (!points || !isFar) paintMissing(ctx, ground, view, width, height)
  paintPointedOut(ctx, ground, view, { width, height })
}

/** The qubits alone: lines, or a field of points. */
export function* paintFabric(
  ctx: Canvas2D,
  ground: Ground,
  view: View,
  { width, height }: { readonly width: number; readonly height: number },
): Generator<void> {
  if (isOfPoints(ground.data)) paintField(ctx, ground, view)
  else paintFreeSegments(ctx, ground, view, width, height)
  yield
}

/** Lattices of points from afar: every run of working qubits in a row as one stripe, with holes where some are missing. */
function paintField(ctx: Canvas2D, { data: { segments, usable }, tokens }: Ground, { scale, x, y }: View) {
  ctx.fillStyle = tokens.hair
  for (let q = 0; q < usable.length; q++) {
    if (!usable[q]) continue
    const first = q
    while (usable[q + 1] && isNextInRow(segments, q)) q++
    const top = y + scale * (segments[4 * first + 1]! - 0.5)
    ctx.fillRect(x + scale * (segments[4 * first]! - 0.5), top, scale * (q - first + 1), scale)
  }
}

const isNextInRow = (segments: Float32Array, q: number): boolean =>
  segments[4 * q + 5] === segments[4 * q + 1] && segments[4 * q + 4] === segments[4 * q]! + 1

function paintFreeSegments(ctx: Canvas2D, ground: Ground, view: View, width: number, height: number) {
  const { data, tokens, used } = ground
  ctx.fillStyle = isBare(used) ? tokens.rule : tokens.hair
  const line = Math.min(1.2, Math.max(0.5, view.scale / 6))
  for (let q = 0; q < data.usable.length; q++)
    if (data.usable[q] && !used[q]) fillSegment(ctx, data.segments, q, view, line, width, height)
}

function paintTails(ctx: Canvas2D, { data, tails }: Ground, view: View, width: number, height: number) {
  const line = Math.max(0.7, SCENE_DEFAULTS.tailWidth * bandWidth(view.scale))
  ctx.globalAlpha = 0.75
  for (const { color, qubits } of tails) {
    ctx.fillStyle = color
    for (const q of qubits) fillSegment(ctx, data.segments, q, view, line, width, height)
  }
  ctx.globalAlpha = 1
}

/** Qubits lie level or upright, so that each is a thin rectangle: far quicker than a stroke. */
function fillSegment(
  ctx: Canvas2D,
  segments: Float32Array,
  qubit: number,
  { scale, x, y }: View,
  line: number,
  width: number,
  height: number,
) {
  const x1 = x + scale * segments[4 * qubit]!
  const y1 = y + scale * segments[4 * qubit + 1]!
  const x2 = x + scale * segments[4 * qubit + 2]!
  const y2 = y + scale * segments[4 * qubit + 3]!
  if (Math.max(x1, x2) < 0 || Math.max(y1, y2) < 0 || Math.min(x1, x2) > width || Math.min(y1, y2) > height) return
  if (y1 === y2) ctx.fillRect(Math.min(x1, x2), y1 - line / 2, Math.abs(x2 - x1), line)
  else ctx.fillRect(x1 - line / 2, Math.min(y1, y2), line, Math.abs(y2 - y1))
}

function paintCouplers(ctx: Canvas2D, { data, tokens }: Ground, { scale, x, y }: View, width: number, height: number) {
  const { places } = data
  const crossings = scale >= GROUND_DEFAULTS.crossingsFrom
  ctx.beginPath()
  const dot = Math.min(2, scale / 14)
  for (let at = 0; at < places.length; at += 4) {
    const x1 = x + scale * places[at]!
    const y1 = y + scale * places[at + 1]!
    const x2 = x + scale * places[at + 2]!
    const y2 = y + scale * places[at + 3]!
    if (Math.max(x1, x2) < -scale || Math.max(y1, y2) < -scale) continue
    if (Math.min(x1, x2) > width + scale || Math.min(y1, y2) > height + scale) continue
    if (x1 !== x2 || y1 !== y2) {
      ctx.moveTo(x1, y1)
      ctx.lineTo(x2, y2)
    } else if (crossings) {
      ctx.moveTo(x1 - dot, y1 - dot)
      ctx.lineTo(x1 + dot, y1 + dot)
      ctx.moveTo(x1 - dot, y1 + dot)
      ctx.lineTo(x1 + dot, y1 - dot)
    }
  }
  ctx.strokeStyle = tokens.rule
  ctx.lineWidth = 1
  ctx.stroke()
}

function paintDots(
  ctx: Canvas2D,
  { data, tokens, used }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  if (scale < GROUND_DEFAULTS.dotsFrom) return
  const bare = isBare(used)
  const radius = Math.min(2, Math.max(bare ? 1.1 : 0.7, 0.14 * scale))
  ctx.globalAlpha = bare ? 0.9 : Math.min(0.85, 0.35 + scale / 26)
  ctx.fillStyle = tokens.edge
  for (let q = 0; q < data.usable.length; q++) {
    if (!data.usable[q] || used[q]) continue
    const px = x + (scale * (data.segments[4 * q]! + data.segments[4 * q + 2]!)) / 2
    const py = y + (scale * (data.segments[4 * q + 1]! + data.segments[4 * q + 3]!)) / 2
    if (px < -2 || py < -2 || px > width + 2 || py > height + 2) continue
    if (radius < 1.2) ctx.fillRect(px - radius, py - radius, 2 * radius, 2 * radius)
    else {
      ctx.beginPath()
      ctx.arc(px, py, radius, 0, 2 * Math.PI)
      ctx.fill()
    }
  }
  ctx.globalAlpha = 1
}
