import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'
import { colourOfStep, weightOfStep, widthOfStep } from './coefficient-scale'
import type { CoefficientScale } from './coefficient-scale'

/** Lines of a problem graph. */
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
  /** Lines from which they let each other shine through, the more the more there are. */
  opaqueUpTo: 400,
  leastOpacity: 0.16,
}

export interface LineLook {
  readonly tokens: Tokens
  /** Factor on all widths. */
  readonly thickness: number
  /** Whether sign is told by dashes; see LINE_DEFAULTS.dashedUpTo. */
  readonly dashed: boolean
  readonly opacity: number
}

/** How thick and how opaque so many lines are drawn, that the strong ones stay in sight. */
export function lookOfLines(lines: number, tokens: Tokens, thickness: number): LineLook {
  const { opaqueUpTo, leastOpacity, dashedUpTo } = LINE_DEFAULTS
  const crowding = Math.min(1, opaqueUpTo / Math.max(1, lines))
  const opacity = Math.max(leastOpacity, Math.sqrt(crowding))
  return { tokens, thickness: thickness * (0.6 + 0.4 * opacity), dashed: lines <= dashedUpTo, opacity }
}

/**
 * Draws lines step by step from the weakest, each step in its colour and width, positive ones dashed. Both signs of a
 * step take turns, so that neither covers the other. Yields now and then, for the drawing to be spread over frames.
 */
export function* paintLines(
  ctx: CanvasRenderingContext2D,
  lines: GraphLines,
  view: View,
  look: LineLook,
): Generator<undefined> {
  for (const { step, interactions } of strokesOf(lines)) {
    const share = weightOfStep(lines.scale, step)
    ctx.globalAlpha = look.opacity + (1 - look.opacity) * 0.55 * share * share * look.opacity
    ctx.strokeStyle = colourOfStep(lines.scale, step, look.tokens)
    ctx.lineWidth = look.thickness * widthOfStep(lines.scale, step)
    ctx.setLineDash(look.dashed && step > 0 ? [...LINE_DEFAULTS.dash] : [])
    strokeAll(ctx, lines, interactions, view)
    yield
  }
  ctx.globalAlpha = 1
  ctx.setLineDash([])
}

interface Stroke {
  readonly step: number
  readonly interactions: readonly number[]
}

function strokesOf({ steps, interactions }: GraphLines): Stroke[] {
  const groups = new Map<number, number[]>()
  for (const interaction of interactions) {
    const step = steps[interaction]!
    const group = groups.get(step)
    if (group) group.push(interaction)
    else groups.set(step, [interaction])
  }
  const sizes = [...new Set([...groups.keys()].map(Math.abs))].sort((a, b) => a - b)
  return sizes.flatMap((size) => {
    const strokes: Stroke[] = []
    const both = size === 0 ? [0] : [-size, size]
    const most = Math.max(...both.map((step) => groups.get(step)?.length ?? 0))
    for (let from = 0; from < most; from += LINE_DEFAULTS.chunk)
      for (const step of both) {
        const chunk = groups.get(step)?.slice(from, from + LINE_DEFAULTS.chunk) ?? []
        if (chunk.length) strokes.push({ step, interactions: chunk })
      }
    return strokes
  })
}

function strokeAll(
  ctx: CanvasRenderingContext2D,
  { positions, rows, cols }: GraphLines,
  interactions: readonly number[],
  { scale, x, y }: View,
): void {
  ctx.beginPath()
  for (const interaction of interactions) {
    const a = 2 * rows[interaction]!
    const b = 2 * cols[interaction]!
    ctx.moveTo(x + scale * positions[a]!, y + scale * positions[a + 1]!)
    ctx.lineTo(x + scale * positions[b]!, y + scale * positions[b + 1]!)
  }
  ctx.stroke()
}
