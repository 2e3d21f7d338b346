import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'
import { colourOfStep, weightOfStep, widthOfStep } from './coefficient-scale'
import type { CoefficientScale } from './coefficient-scale'

/** Lines of a problem graph, in the order of drawing. */
export interface GraphLines {
  /** Framed x and y of each variable. */
  readonly positions: Float32Array
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  /** Step of each interaction on the scale. */
  readonly steps: Int8Array
  readonly scale: CoefficientScale
  /** Interactions to be drawn. */
  readonly interactions: readonly number[]
}

export const LINE_DEFAULTS = {
  dash: [5, 3.5] as readonly number[],
  /** Lines up to which positive ones are dashed; among more, dashes are too fine to be seen and slow to draw. */
  dashedUpTo: 3000,
  /** Lines in one stroke: longer paths take the processor much longer. */
  chunk: 160,
  /** Lines from which they let each other shine through. */
  opaqueUpTo: 400,
}

export interface LineLook {
  readonly tokens: Tokens
  /** Factor on all widths. */
  readonly thickness: number
  /** Whether sign is told by dashes; see LINE_DEFAULTS.dashedUpTo. */
  readonly dashed: boolean
  readonly opaque: boolean
}

/** Draws lines step by step from the weakest, each step in its colour and width, positive ones dashed. */
export function paintLines(ctx: CanvasRenderingContext2D, lines: GraphLines, view: View, look: LineLook): void {
  const groups = new Map<number, number[]>()
  for (const interaction of lines.interactions) {
    const step = lines.steps[interaction]!
    const group = groups.get(step)
    if (group) group.push(interaction)
    else groups.set(step, [interaction])
  }
  const order = [...groups.keys()].sort((a, b) => Math.abs(a) - Math.abs(b) || a - b)
  for (const step of order) {
    const share = weightOfStep(lines.scale, step)
    ctx.globalAlpha = look.opaque ? 1 : 0.25 + 0.65 * share * share
    ctx.strokeStyle = colourOfStep(lines.scale, step, look.tokens)
    ctx.lineWidth = look.thickness * widthOfStep(lines.scale, step)
    ctx.setLineDash(look.dashed && step > 0 ? [...LINE_DEFAULTS.dash] : [])
    strokeAll(ctx, lines, groups.get(step)!, view)
  }
  ctx.globalAlpha = 1
  ctx.setLineDash([])
}

function strokeAll(
  ctx: CanvasRenderingContext2D,
  { positions, rows, cols }: GraphLines,
  interactions: readonly number[],
  { scale, x, y }: View,
): void {
  for (let from = 0; from < interactions.length; from += LINE_DEFAULTS.chunk) {
    ctx.beginPath()
    for (const interaction of interactions.slice(from, from + LINE_DEFAULTS.chunk)) {
      const a = 2 * rows[interaction]!
      const b = 2 * cols[interaction]!
      ctx.moveTo(x + scale * positions[a]!, y + scale * positions[a + 1]!)
      ctx.lineTo(x + scale * positions[b]!, y + scale * positions[b + 1]!)
    }
    ctx.stroke()
  }
}
