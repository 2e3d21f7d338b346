import type { Canvas2D } from './paint-edges'
import { GROUND_DEFAULTS } from './ground'
import type { Ground } from './ground'
import { placesOfPair } from './places'
import { traceDiamond } from './shapes'
import type { Tokens } from './tokens'
import type { LatticeData, View } from './types'

/** Missing qubits as hollow squares, missing couplers as hollow diamonds. */
export function paintMissing(
  ctx: Canvas2D,
  { data, tokens, hiddenKinds }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  const side = sideOf(scale)
  const square = (qubit: number) => {
    const px = Math.round(x + (scale * (data.segments[4 * qubit]! + data.segments[4 * qubit + 2]!)) / 2)
    const py = Math.round(y + (scale * (data.segments[4 * qubit + 1]! + data.segments[4 * qubit + 3]!)) / 2)
    if (px < -9 || py < -9 || px > width + 9 || py > height + 9) return
    const [left, top] = [px - Math.round(side / 2) + 0.5, py - Math.round(side / 2) + 0.5]
    ctx.fillRect(left, top, Math.round(side), Math.round(side))
    ctx.strokeRect(left, top, Math.round(side), Math.round(side))
  }
  ctx.lineWidth = 1.1
  ctx.fillStyle = tokens.paper
  ctx.strokeStyle = tokens.ink2
  if (!hiddenKinds?.has('missing')) for (let q = 0; q < data.usable.length; q++) if (!data.usable[q]) square(q)
  if (!hiddenKinds?.has('missingCouplers')) paintMissingCouplers(ctx, data, tokens, { scale, x, y })
}

/**
 * What is pointed out, at any distance: dashed squares around qubits and dashed diamonds around couplers that were lost,
 * rings around parts that work again.
 */
export function paintPointedOut(
  ctx: Canvas2D,
  { data, tokens, marks, hiddenKinds }: Ground,
  view: View,
  extent: Extent,
) {
  if (!marks) return
  ctx.lineWidth = 1.4
  const radius = sideOf(view.scale) / 2 + 3
  const shownAt = (x: number, y: number): boolean =>
    x > -radius && y > -radius && x < extent.width + radius && y < extent.height + radius
  const each = (qubits: Uint32Array, couplers: Uint32Array | undefined, ring: boolean) => {
    for (const [x, y] of middlesOf(data, qubits, view))
      if (shownAt(x, y)) (ring ? addRing : addSquare)(ctx, x, y, radius)
    for (const [x, y] of placesOf(data, couplers, view))
      if (shownAt(x, y)) (ring ? addRing : addDiamond)(ctx, x, y, radius)
  }
  if (!hiddenKinds?.has('marks')) {
    ctx.setLineDash([3, 2])
    ctx.strokeStyle = tokens.clay
    each(marks.qubits, marks.couplers, false)
    ctx.setLineDash([])
  }
  if (!marks.regained || hiddenKinds?.has('regained')) return
  ctx.strokeStyle = tokens.leaf
  each(marks.regained.qubits, marks.regained.couplers, true)
}

interface Extent {
  readonly width: number
  readonly height: number
}

function* middlesOf({ segments }: LatticeData, qubits: Uint32Array, { scale, x, y }: View) {
  for (const q of qubits)
    yield [
      x + (scale * (segments[4 * q]! + segments[4 * q + 2]!)) / 2,
      y + (scale * (segments[4 * q + 1]! + segments[4 * q + 3]!)) / 2,
    ] as const
}

function* placesOf({ segments }: LatticeData, pairs: Uint32Array | undefined, { scale, x, y }: View) {
  for (let k = 0; k < (pairs?.length ?? 0); k += 2) {
    const [x1, y1, x2, y2] = placesOfPair(segments, pairs![k]!, pairs![k + 1]!)
    yield [x + (scale * (x1 + x2)) / 2, y + (scale * (y1 + y2)) / 2] as const
  }
}

function addSquare(ctx: Canvas2D, x: number, y: number, radius: number) {
  const side = Math.round(2 * radius)
  ctx.strokeRect(Math.round(x) - Math.round(radius) + 0.5, Math.round(y) - Math.round(radius) + 0.5, side, side)
}

function addDiamond(ctx: Canvas2D, x: number, y: number, radius: number) {
  ctx.beginPath()
  ctx.moveTo(x, y - radius)
  ctx.lineTo(x + radius, y)
  ctx.lineTo(x, y + radius)
  ctx.lineTo(x - radius, y)
  ctx.closePath()
  ctx.stroke()
}

function addRing(ctx: Canvas2D, x: number, y: number, radius: number) {
  ctx.beginPath()
  ctx.moveTo(x + radius, y)
  ctx.arc(x, y, radius, 0, 2 * Math.PI)
  ctx.stroke()
}

const sideOf = (scale: number): number => Math.min(8, Math.max(scale < 4 ? 2.5 : 3.5, 0.6 * scale))

function paintMissingCouplers(ctx: Canvas2D, data: LatticeData, tokens: Tokens, { scale, x, y }: View) {
  const pairs = data.missingCouplers
  if (!pairs || scale < GROUND_DEFAULTS.couplersFrom) return
  const arm = Math.min(3, 0.22 * scale)
  ctx.beginPath()
  for (let k = 0; k < pairs.length; k += 2) {
    const [x1, y1, x2, y2] = placesOfPair(data.segments, pairs[k]!, pairs[k + 1]!)
    const px = x + (scale * (x1 + x2)) / 2
    const py = y + (scale * (y1 + y2)) / 2
    traceDiamond(ctx, px, py, arm)
  }
  ctx.fillStyle = tokens.paper
  ctx.fill()
  ctx.strokeStyle = tokens.edge
  ctx.lineWidth = 1
  ctx.stroke()
}
