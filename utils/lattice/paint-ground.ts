import { placesOfPair } from './places'
import { bandWidth } from './framing'
import { SCENE_DEFAULTS } from './scene'
import type { Tails } from './scene'
import type { Tokens } from './tokens'
import type { LatticeData, MarkLayer, View } from './types'

/** What lies beneath the chains: free and missing qubits, couplers, marks. */
export interface Ground {
  readonly data: LatticeData
  readonly tokens: Tokens
  /** 1 where a chain uses the qubit: its segment and dot are left to the chain. */
  readonly used: Uint8Array
  readonly tails: readonly Tails[]
  readonly marks?: MarkLayer | null
}

export const GROUND_DEFAULTS = {
  /** Line spacing in pixels from which couplers along lines, and at crossings, are worth drawing. */
  couplersFrom: 7,
  crossingsFrom: 18,
  dotsFrom: 2.2,
}

/** Without chains the machine itself is the figure and is drawn more firmly. */
const isBare = (used: Uint8Array): boolean => !used.includes(1)

/** Paints the part of the ground that falls on a canvas of the given size in pixels. */
export function paintGround(ctx: CanvasRenderingContext2D, ground: Ground, view: View, width: number, height: number) {
  ctx.clearRect(0, 0, width, height)
  paintSegments(ctx, ground, view, width, height)
  if (view.scale >= GROUND_DEFAULTS.couplersFrom) paintCouplers(ctx, ground, view, width, height)
  paintDots(ctx, ground, view, width, height)
  paintMissing(ctx, ground, view, width, height)
}

function paintSegments(
  ctx: CanvasRenderingContext2D,
  { data, tokens, used, tails }: Ground,
  view: View,
  width: number,
  height: number,
) {
  ctx.beginPath()
  for (let q = 0; q < data.usable.length; q++)
    if (data.usable[q] && !used[q]) traceSegment(ctx, data.segments, q, view, width, height)
  ctx.strokeStyle = isBare(used) ? tokens.rule : tokens.hair
  ctx.lineWidth = Math.min(1.2, Math.max(0.5, view.scale / 6))
  ctx.stroke()
  ctx.lineWidth = Math.max(0.7, SCENE_DEFAULTS.tailWidth * bandWidth(view.scale))
  ctx.globalAlpha = 0.75
  for (const { color, qubits } of tails) {
    ctx.beginPath()
    for (const q of qubits) traceSegment(ctx, data.segments, q, view, width, height)
    ctx.strokeStyle = color
    ctx.stroke()
  }
  ctx.globalAlpha = 1
}

function traceSegment(
  ctx: CanvasRenderingContext2D,
  segments: Float32Array,
  qubit: number,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  const x1 = x + scale * segments[4 * qubit]!
  const y1 = y + scale * segments[4 * qubit + 1]!
  const x2 = x + scale * segments[4 * qubit + 2]!
  const y2 = y + scale * segments[4 * qubit + 3]!
  if (Math.max(x1, x2) < 0 || Math.max(y1, y2) < 0 || Math.min(x1, x2) > width || Math.min(y1, y2) > height) return
  ctx.moveTo(x1, y1)
  ctx.lineTo(x2, y2)
}

function paintCouplers(
  ctx: CanvasRenderingContext2D,
  { data, tokens }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  const { places } = data
  const crossings = scale >= GROUND_DEFAULTS.crossingsFrom
  ctx.beginPath()
  const dot = Math.min(2, scale / 14)
  for (let at = 0; at < places.length; at += 4) {
    const x1 = x + scale * places[at]!
    const y1 = y + scale * places[at + 1]!
    if (x1 < -scale || y1 < -scale || x1 > width + scale || y1 > height + scale) continue
    const x2 = x + scale * places[at + 2]!
    const y2 = y + scale * places[at + 3]!
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
  ctx: CanvasRenderingContext2D,
  { data, tokens, used }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  if (scale < GROUND_DEFAULTS.dotsFrom) return
  const bare = isBare(used)
  const radius = Math.min(2, Math.max(bare ? 1.1 : 0.7, 0.14 * scale))
  ctx.beginPath()
  for (let q = 0; q < data.usable.length; q++) {
    if (!data.usable[q] || used[q]) continue
    const px = x + (scale * (data.segments[4 * q]! + data.segments[4 * q + 2]!)) / 2
    const py = y + (scale * (data.segments[4 * q + 1]! + data.segments[4 * q + 3]!)) / 2
    if (px < -2 || py < -2 || px > width + 2 || py > height + 2) continue
    ctx.moveTo(px + radius, py)
    ctx.arc(px, py, radius, 0, 2 * Math.PI)
  }
  ctx.globalAlpha = bare ? 0.9 : Math.min(0.85, 0.35 + scale / 26)
  ctx.fillStyle = tokens.edge
  ctx.fill()
  ctx.globalAlpha = 1
}

function paintMissing(
  ctx: CanvasRenderingContext2D,
  { data, tokens, marks }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  const side = Math.min(8, Math.max(3.5, 0.6 * scale))
  const square = (qubit: number, size: number) => {
    const px = Math.round(x + (scale * (data.segments[4 * qubit]! + data.segments[4 * qubit + 2]!)) / 2)
    const py = Math.round(y + (scale * (data.segments[4 * qubit + 1]! + data.segments[4 * qubit + 3]!)) / 2)
    if (px < -9 || py < -9 || px > width + 9 || py > height + 9) return
    ctx.rect(px - Math.round(size / 2) + 0.5, py - Math.round(size / 2) + 0.5, Math.round(size), Math.round(size))
  }
  ctx.lineWidth = 1.1
  ctx.beginPath()
  for (let q = 0; q < data.usable.length; q++) if (!data.usable[q]) square(q, side)
  ctx.fillStyle = tokens.paper
  ctx.fill()
  ctx.strokeStyle = tokens.ink2
  ctx.stroke()
  paintMissingCouplers(ctx, data, tokens, { scale, x, y })
  if (!marks) return
  ctx.beginPath()
  for (const qubit of marks.qubits) square(qubit, side + 6)
  ctx.setLineDash([3, 2])
  ctx.strokeStyle = tokens.clay
  ctx.lineWidth = 1.4
  ctx.stroke()
  ctx.setLineDash([])
}

function paintMissingCouplers(ctx: CanvasRenderingContext2D, data: LatticeData, tokens: Tokens, { scale, x, y }: View) {
  const pairs = data.missingCouplers
  if (!pairs || scale < GROUND_DEFAULTS.couplersFrom) return
  const arm = Math.min(3, 0.22 * scale)
  ctx.beginPath()
  for (let k = 0; k < pairs.length; k += 2) {
    const [x1, y1, x2, y2] = placesOfPair(data.segments, pairs[k]!, pairs[k + 1]!)
    const px = x + (scale * (x1 + x2)) / 2
    const py = y + (scale * (y1 + y2)) / 2
    ctx.moveTo(px, py - arm)
    ctx.lineTo(px + arm, py)
    ctx.lineTo(px, py + arm)
    ctx.lineTo(px - arm, py)
    ctx.closePath()
  }
  ctx.fillStyle = tokens.paper
  ctx.fill()
  ctx.strokeStyle = tokens.edge
  ctx.lineWidth = 1
  ctx.stroke()
}
