import { coverageOf } from '../coverage'
import { placeTags } from '../labels'
import type { Canvas2D } from '../paint-edges'
import { paintGround } from '../paint-ground'
import { paintOverlay } from '../paint-overlay'
import { paintRulerLeft, paintRulerTop } from '../paint-ruler'
import { levelScene, paintScene, sceneScale } from '../paint-scene'
import { paintTag } from '../paint-tags'
import { buildScene } from '../scene'
import { overlayOf, tagInputOf } from '../tag-input'
import { requestTags, tagBands } from '../tag-requests'
import { tailsOf } from '../tails'
import { readTokens } from '../tokens'
import { layoutOf, PICTURE_DEFAULTS } from './layout'
import type { DrawnLattice, Extent, PictureLayout } from './layout'
import { legendOf } from './legend'
import type { LegendItem } from './legend'

export interface PictureWords {
  readonly title: string
  /** What it shows, a line each; at most two find room. */
  readonly lines: readonly string[]
}

/** A picture of the lattice to be saved: on paper of the light theme, with title, ruler, legend and scale. */
export interface SavedPicture {
  readonly layout: PictureLayout
  /** @param group names what is painted meanwhile, where the canvas keeps names */
  paint(ctx: CanvasRenderingContext2D, group?: (id: string, paint: () => void) => void): void
}

const FONTS = {
  title: '600 20px "IBM Plex Sans", system-ui, sans-serif',
  words: '400 13px "IBM Plex Sans", system-ui, sans-serif',
  legend: '400 12px "IBM Plex Sans", system-ui, sans-serif',
}
/** Lines of the lattice that the scale shows: those between two numbers of the ruler. */
const SCALE_LINES = 12
const SIGN_WIDTH = 28
const LEGEND_GAP = { words: 8, items: 26 }
/** Width of a letter of the legend, a little generous: rows are filled before there is a canvas to measure on. */
const LEGEND_LETTER = 6.3

export function savedPicture(drawn: DrawnLattice, extent: Extent, words: PictureWords): SavedPicture {
  const look = { ...drawn.look, tokens: readTokens(() => ''), hovered: null }
  const legend = legendOf(drawn.source, look)
  const draft = layoutOf(drawn, extent, 1)
  const rows = legendRows(legend, draft.frame.x2 - draft.frame.x1, draft.view.scale)
  const layout = layoutOf(drawn, extent, rows.length)
  return {
    layout,
    paint(ctx, group = (_, paint) => paint()) {
      ctx.fillStyle = look.tokens.paper
      ctx.fillRect(0, 0, layout.width, layout.height)
      group('title', () => paintWords(ctx, words, look.tokens.ink, look.tokens.ink2))
      paintFramed(ctx, { ...drawn, look }, layout, group)
      group('ruler', () => paintRulers(ctx, { ...drawn, look }, layout))
      group('legend', () => paintLegend(ctx, rows, layout, look.tokens))
      group('scale', () => paintScale(ctx, layout, look.tokens))
    },
  }
}

function paintWords(ctx: Canvas2D, { title, lines }: PictureWords, ink: string, ink2: string): void {
  const { margin } = PICTURE_DEFAULTS
  ctx.textAlign = 'start'
  ctx.textBaseline = 'alphabetic'
  ctx.font = FONTS.title
  ctx.fillStyle = ink
  ctx.fillText(title, margin, margin + 18)
  ctx.font = FONTS.words
  ctx.fillStyle = ink2
  lines.forEach((text, k) => ctx.fillText(text, margin, margin + 40 + 19 * k))
}

/** Everything inside the frame, and the frame. */
function paintFramed(
  ctx: CanvasRenderingContext2D,
  { source, look }: DrawnLattice,
  { frame, view }: PictureLayout,
  group: NonNullable<Parameters<SavedPicture['paint']>[1]>,
): void {
  const size = { width: frame.x2 - frame.x1, height: frame.y2 - frame.y1 }
  const input = { ...source, ...look }
  const used = Uint8Array.from(source.geometry.roles.owner, (chain) => (chain < 0 ? 0 : 1))
  const scale = sceneScale(source.data, view, size)
  ctx.save()
  ctx.beginPath()
  ctx.rect(frame.x1, frame.y1, size.width, size.height)
  ctx.clip()
  ctx.translate(frame.x1, frame.y1)
  group('machine', () => drain(paintGround(ctx, { ...input, used, tails: tailsOf(input) }, view, size)))
  group('chains', () => drain(paintScene(ctx, levelScene(buildScene(input)), view, scale, look.tokens)))
  if (look.overlay) {
    const overlay = overlayOf(source, look.overlay)
    group('pointed-out', () => paintOverlay(ctx, overlay, view, look.tokens))
  }
  group('labels', () => paintLabels(ctx, { source, look }, view, size))
  ctx.restore()
  ctx.strokeStyle = look.tokens.ink
  ctx.lineWidth = 1
  ctx.strokeRect(frame.x1 - 0.5, frame.y1 - 0.5, size.width + 1, size.height + 1)
}

/** The painters pause now and then on the screen; here they run to their end. */
function drain(steps: Iterable<void>): void {
  for (const _ of steps);
}

function paintLabels(
  ctx: CanvasRenderingContext2D,
  { source, look }: Pick<DrawnLattice, 'source' | 'look'>,
  view: PictureLayout['view'],
  { width, height }: { width: number; height: number },
): void {
  const { geometry, bounds } = source
  const { requests, looks } = requestTags(ctx, tagInputOf(source, look, tagBands(geometry)), new Map())
  const coverage = geometry.bands.length > 0 ? coverageOf(geometry.bands, bounds) : null
  const placed = placeTags(requests, view, { x1: 2, y1: 2, x2: width - 2, y2: height - 2 }, coverage)
  for (const { key, box } of placed.reverse()) paintTag(ctx, looks[key]!, box, look.tokens)
}

function paintRulers(ctx: CanvasRenderingContext2D, { source, look }: DrawnLattice, { frame, view }: PictureLayout) {
  const { ruler: inset } = PICTURE_DEFAULTS
  ctx.save()
  ctx.translate(frame.x1 - inset, frame.y1 - inset)
  paintRulerTop(ctx, view, { extent: frame.x2 - frame.x1, inset }, source.bounds, look.tokens)
  paintRulerLeft(ctx, view, { extent: frame.y2 - frame.y1, inset }, source.bounds, look.tokens)
  ctx.restore()
}

interface PlacedItem {
  readonly item: LegendItem
  readonly x: number
}

/** The signs in as many rows as they need; the first leaves room for the scale at its right end. */
function legendRows(items: readonly LegendItem[], width: number, scale: number): PlacedItem[][] {
  const rows: PlacedItem[][] = [[]]
  let x = 0
  for (const item of items) {
    const needed = SIGN_WIDTH + LEGEND_GAP.words + LEGEND_LETTER * item.words.length
    const room = rows.length === 1 ? width - SCALE_LINES * scale - 90 : width
    if (x > 0 && x + needed > room) {
      rows.push([])
      x = 0
    }
    rows.at(-1)!.push({ item, x })
    x += needed + LEGEND_GAP.items
  }
  return rows
}

function paintLegend(
  ctx: Canvas2D,
  rows: readonly (readonly PlacedItem[])[],
  { frame }: PictureLayout,
  tokens: DrawnLattice['look']['tokens'],
): void {
  rows.forEach((row, k) =>
    row.forEach(({ item, x }) => {
      ctx.save()
      ctx.translate(frame.x1 + x, legendMiddle(frame.y2, k))
      item.paint(ctx, tokens)
      ctx.font = FONTS.legend
      ctx.textAlign = 'start'
      ctx.textBaseline = 'middle'
      ctx.fillStyle = tokens.ink2
      ctx.fillText(item.words, SIGN_WIDTH + LEGEND_GAP.words, 0)
      ctx.restore()
    }),
  )
}

const legendMiddle = (bottom: number, row: number): number => bottom + 12 + (row + 0.5) * PICTURE_DEFAULTS.legendLine

/** A bar as long as twelve lines of the lattice. */
function paintScale(
  ctx: Canvas2D,
  { frame, view }: PictureLayout,
  { ink, ink2 }: DrawnLattice['look']['tokens'],
): void {
  const length = SCALE_LINES * view.scale
  const y = legendMiddle(frame.y2, 0)
  ctx.beginPath()
  ctx.moveTo(frame.x2 - length, y - 4)
  ctx.lineTo(frame.x2 - length, y + 4)
  ctx.moveTo(frame.x2 - length, y)
  ctx.lineTo(frame.x2, y)
  ctx.moveTo(frame.x2, y - 4)
  ctx.lineTo(frame.x2, y + 4)
  ctx.strokeStyle = ink
  ctx.lineWidth = 1
  ctx.stroke()
  ctx.font = FONTS.legend
  ctx.textAlign = 'end'
  ctx.textBaseline = 'middle'
  ctx.fillStyle = ink2
  ctx.fillText(`${SCALE_LINES} lines`, frame.x2 - length - LEGEND_GAP.words, y)
}
