import { EDGE_KINDS, HATCH } from './scene-types'
import { fillEdge, placeEdge } from './trace'
import type { PlacedEdge } from './trace'
import type { SceneEdge } from './scene-types'
import type { Tokens } from './tokens'
import type { View } from './types'

export type Canvas2D = CanvasRenderingContext2D | OffscreenCanvasRenderingContext2D

/**
 * Paints edges of one level: all casings first, then all of one colour at once, then what lies in them. Edges of one
 * level do not cover one another but for their casings, so the order among them does not show.
 */
export function paintEdges(
  ctx: Canvas2D,
  edges: readonly SceneEdge[],
  view: View,
  bandPixels: number,
  tokens: Tokens,
): void {
  const placed = edges.map((edge) => placeEdge(edge, view, bandPixels))
  const ofKind = (kind: number) => placed.filter(({ edge }) => edge.kind === kind)
  fillAll(ctx, placed, tokens.paper, (one) => (one.edge.casing > 0 ? one.radius : 0))
  paintPlain(ctx, ofKind(EDGE_KINDS.line), (one) => one.radius)
  paintBands(ctx, ofKind(EDGE_KINDS.band), tokens)
  paintTubes(ctx, ofKind(EDGE_KINDS.tube), tokens)
  for (const one of ofKind(EDGE_KINDS.dash)) paintDash(ctx, one)
}

type HalfWidth = (placed: PlacedEdge) => number

function fillAll(ctx: Canvas2D, placed: readonly PlacedEdge[], style: string | CanvasPattern, half: HalfWidth): void {
  ctx.fillStyle = style
  for (const one of placed) fillEdge(ctx, one, half(one))
}

function byColour(placed: readonly PlacedEdge[]): Map<string, PlacedEdge[]> {
  const groups = new Map<string, PlacedEdge[]>()
  for (const one of placed) {
    const group = groups.get(one.edge.color)
    if (group) group.push(one)
    else groups.set(one.edge.color, [one])
  }
  return groups
}

function paintPlain(ctx: Canvas2D, placed: readonly PlacedEdge[], half: HalfWidth): void {
  for (const [colour, group] of byColour(placed)) fillAll(ctx, group, colour, half)
}

const casingOf = ({ edge, total }: PlacedEdge) => edge.casing * Math.min(1, 0.16 * total)
const outlineOf = ({ edge, total }: PlacedEdge) => edge.outline * Math.min(1.6, 0.15 * total)
const gapOf = ({ edge, total }: PlacedEdge) => edge.outline * Math.min(1.4, 0.11 * total)
const innerOf = (one: PlacedEdge) => one.radius - casingOf(one) - outlineOf(one) - gapOf(one)

/** Half width below which an inlay would only blur the hue. */
const LEAST_INLAID = 1.3

function paintBands(ctx: Canvas2D, bands: readonly PlacedEdge[], tokens: Tokens): void {
  const outlined = bands.filter(({ edge }) => edge.outline > 0)
  fillAll(ctx, outlined, tokens.ink, (one) => one.radius - casingOf(one))
  fillAll(ctx, outlined, tokens.paper, (one) => one.radius - casingOf(one) - outlineOf(one))
  paintPlain(ctx, bands, innerOf)
  const inlaid = bands.filter((one) => one.edge.inlay > 0 && innerOf(one) > LEAST_INLAID)
  ctx.fillStyle = tokens.paper
  for (const one of inlaid) {
    if (one.edge.inlay === 1) fillEdge(ctx, one, Math.max(0.5, 0.3 * innerOf(one)))
    else fillDots(ctx, one, Math.max(0.6, 0.4 * innerOf(one)))
  }
}

/** Dots half-way between lines of the lattice, where no other band crosses; fewer where lines are close together. */
function fillDots(ctx: Canvas2D, { edge, x, y, dx, dy, length, unit, radius }: PlacedEdge, dot: number): void {
  const pace = 2 ** Math.ceil(Math.log2(Math.max(1, 8 / unit)))
  const first = Math.ceil(edge.from / pace - 0.5)
  ctx.beginPath()
  for (let k = first; (k + 0.5) * pace < edge.from + edge.span; k++) {
    const at = ((k + 0.5) * pace - edge.from) * unit
    if (at < radius || at > length - radius) continue
    ctx.moveTo(x + at * dx + dot, y + at * dy)
    ctx.arc(x + at * dx, y + at * dy, dot, 0, 2 * Math.PI)
  }
  ctx.fill()
}

const wallOf = ({ edge }: PlacedEdge) => (edge.outline > 0 ? 1.5 : 1)
const boreOf = (one: PlacedEdge) => Math.max(0.5, one.radius - casingOf(one) - wallOf(one))

function paintTubes(ctx: Canvas2D, tubes: readonly PlacedEdge[], tokens: Tokens): void {
  const isFirm = ({ edge }: PlacedEdge) => edge.outline > 0 || edge.inlay === HATCH
  const wall: HalfWidth = (one) => one.radius - casingOf(one)
  fillAll(
    ctx,
    tubes.filter((one) => !isFirm(one)),
    tokens.edge,
    wall,
  )
  fillAll(ctx, tubes.filter(isFirm), tokens.ink, wall)
  fillAll(ctx, tubes, tokens.paper, boreOf)
  for (const [colour, group] of byColour(tubes)) {
    const hatched = group.filter(({ edge }) => edge.inlay === HATCH)
    fillUpTo(
      ctx,
      group.filter(({ edge }) => edge.inlay !== HATCH),
      colour,
    )
    if (hatched.length > 0) fillUpTo(ctx, hatched, hatching(ctx, colour))
  }
  ctx.fillStyle = tokens.ink
  for (const one of tubes) {
    const at = (one.edge.value - one.edge.from) * one.unit
    fillEdge(ctx, one, boreOf(one), [Math.max(0, at - 0.7), Math.min(one.length, at + 0.7)])
  }
}

function fillUpTo(ctx: Canvas2D, tubes: readonly PlacedEdge[], style: string | CanvasPattern): void {
  ctx.fillStyle = style
  for (const one of tubes) fillEdge(ctx, one, boreOf(one), [0, (one.edge.value - one.edge.from) * one.unit])
}

const HATCH_PIXELS = 5

/** Slanting lines of a colour, the same for tubes either way. */
function hatching(ctx: Canvas2D, colour: string): CanvasPattern | string {
  const tile =
    typeof OffscreenCanvas === 'undefined'
      ? Object.assign(document.createElement('canvas'), { width: 2 * HATCH_PIXELS, height: 2 * HATCH_PIXELS })
      : new OffscreenCanvas(2 * HATCH_PIXELS, 2 * HATCH_PIXELS)
  const pen = tile.getContext('2d') as Canvas2D | null
  if (!pen) return colour
  pen.strokeStyle = colour
  pen.lineWidth = 4
  for (let x = -10; x <= 20; x += 2 * HATCH_PIXELS) {
    pen.moveTo(x, 2 * HATCH_PIXELS)
    pen.lineTo(x + 2 * HATCH_PIXELS, 0)
  }
  pen.stroke()
  const pattern = ctx.createPattern(tile, 'repeat')
  pattern?.setTransform({ a: 0.5, d: 0.5 })
  return pattern ?? colour
}

function paintDash(ctx: Canvas2D, one: PlacedEdge): void {
  const { edge, x, y, dx, dy, length, total } = one
  const period = Math.min(11, Math.max(6, 1.3 * total))
  ctx.setLineDash([0.58 * period, 0.42 * period])
  ctx.lineCap = 'butt'
  ctx.lineWidth = 2 * (one.radius - casingOf(one))
  ctx.strokeStyle = edge.color
  ctx.beginPath()
  ctx.moveTo(x, y)
  ctx.lineTo(x + length * dx, y + length * dy)
  ctx.stroke()
  ctx.setLineDash([])
}
