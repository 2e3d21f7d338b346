import type { Canvas2D } from './paint-edges'
import { GROUND_DEFAULTS } from './ground'
import type { Ground } from './ground'
import { placesOfPair } from './places'
import { traceDiamond } from './shapes'
import type { Tokens } from './tokens'
import type { LatticeData, View } from './types'

/** Missing qubits as hollow squares, missing couplers as hollow diamonds, and dashed squares around what is marked. */
export function paintMissing(
  ctx: Canvas2D,
  { data, tokens, marks, hiddenKinds }: Ground,
  { scale, x, y }: View,
  width: number,
  height: number,
) {
  const side = Math.min(8, Math.max(scale < 4 ? 2.5 : 3.5, 0.6 * scale))
  const square = (qubit: number, size: number, isFilled: boolean) => {
    const px = Math.round(x + (scale * (data.segments[4 * qubit]! + data.segments[4 * qubit + 2]!)) / 2)
    const py = Math.round(y + (scale * (data.segments[4 * qubit + 1]! + data.segments[4 * qubit + 3]!)) / 2)
    if (px < -9 || py < -9 || px > width + 9 || py > height + 9) return
    const [left, top] = [px - Math.round(size / 2) + 0.5, py - Math.round(size / 2) + 0.5]
    if (isFilled) ctx.fillRect(left, top, Math.round(size), Math.round(size))
    ctx.strokeRect(left, top, Math.round(size), Math.round(size))
  }
  ctx.lineWidth = 1.1
  ctx.fillStyle = tokens.paper
  ctx.strokeStyle = tokens.ink2
  if (!hiddenKinds?.has('missing'))
    for (let q = 0; q < data.usable.length; q++) if (!data.usable[q]) square(q, side, true)
  if (!hiddenKinds?.has('missingCouplers')) paintMissingCouplers(ctx, data, tokens, { scale, x, y })
  if (!marks || hiddenKinds?.has('marks')) return
  ctx.setLineDash([3, 2])
  ctx.strokeStyle = tokens.clay
  ctx.lineWidth = 1.4
  for (const qubit of marks.qubits) square(qubit, side + 6, false)
  ctx.setLineDash([])
}

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
