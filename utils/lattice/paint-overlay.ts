import { bandWidth } from './framing'
import type { Span } from './spans'
import type { Tokens } from './tokens'
import type { LatticeData, OverlayLayer, View } from './types'

export interface Overlay {
  readonly data: LatticeData
  readonly layer: OverlayLayer
  /** The part of a qubit that its chain needs; a qubit without one is outlined from end to end. */
  readonly spanOf: ReadonlyMap<number, Pick<Span, 'x1' | 'y1' | 'x2' | 'y2'>>
  /** Where a coupler of two qubits meets them: x and y on the first, x and y on the second. */
  readonly placeOf: (a: number, b: number) => readonly [number, number, number, number]
}

export const OVERLAY_DEFAULTS = {
  /** Paper between a band and the line around it, and the line itself, in pixels. */
  gap: 1.5,
  line: 2,
}

/**
 * Qubits and couplers pointed out, such as a found path: an ink line around each qubit, with paper between it and the
 * band so that the band stays in sight, and a square on each coupler.
 */
export function paintOverlay(ctx: CanvasRenderingContext2D, overlay: Overlay, view: View, tokens: Tokens): void {
  const { gap, line } = OVERLAY_DEFAULTS
  const width = bandWidth(view.scale)
  const strokes = overlay.layer.qubits.map((qubit) => strokeOf(overlay, qubit, view))
  ctx.lineCap = 'round'
  ctx.lineWidth = 1
  for (const [x1, y1, x2, y2] of strokes) {
    outline(ctx, [x1, y1, x2, y2], width / 2 + gap, gap, tokens.paper)
    outline(ctx, [x1, y1, x2, y2], width / 2 + gap + line, line, tokens.ink)
  }
  const side = Math.max(5, 0.75 * width)
  for (const [a, b] of overlay.layer.couplers) {
    const [x1, y1, x2, y2] = overlay.placeOf(a, b).map((v, i) => view.scale * v + (i % 2 === 0 ? view.x : view.y)) as [
      number,
      number,
      number,
      number,
    ]
    ctx.strokeStyle = tokens.ink
    ctx.lineWidth = line
    ctx.beginPath()
    ctx.moveTo(x1, y1)
    ctx.lineTo(x2, y2)
    ctx.stroke()
    const [x, y] = [(x1 + x2) / 2, (y1 + y2) / 2]
    ctx.fillStyle = tokens.ink
    ctx.fillRect(x - side / 2 - 1.5, y - side / 2 - 1.5, side + 3, side + 3)
    ctx.fillStyle = tokens.paper
    ctx.fillRect(x - side / 2, y - side / 2, side, side)
  }
}

type Stroke = readonly [number, number, number, number]

function strokeOf({ data, spanOf }: Overlay, qubit: number, { scale, x, y }: View): Stroke {
  const span = spanOf.get(qubit)
  const at = 4 * qubit
  const x1 = span ? span.x1 : data.segments[at]!
  const y1 = span ? span.y1 : data.segments[at + 1]!
  const x2 = span ? span.x2 : data.segments[at + 2]!
  const y2 = span ? span.y2 : data.segments[at + 3]!
  return [x + scale * x1, y + scale * y1, x + scale * x2, y + scale * y2]
}

/** A line of the given thickness around a stroke; `radius` reaches to its outer side. */
function outline(
  ctx: CanvasRenderingContext2D,
  [x1, y1, x2, y2]: Stroke,
  radius: number,
  thickness: number,
  colour: string,
): void {
  const angle = Math.atan2(y2 - y1, x2 - x1)
  const r = radius - thickness / 2
  ctx.beginPath()
  ctx.arc(x1, y1, r, angle + Math.PI / 2, angle - Math.PI / 2)
  ctx.arc(x2, y2, r, angle - Math.PI / 2, angle + Math.PI / 2)
  ctx.closePath()
  ctx.lineWidth = thickness
  ctx.strokeStyle = colour
  ctx.stroke()
}
