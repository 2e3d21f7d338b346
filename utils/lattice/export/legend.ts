import { percent } from '../figures'
import { SCENE_DEFAULTS } from '../scene-types'
import { traceBand, traceDiamond, traceTriangle } from '../shapes'
import type { StageLook, StageSource } from '../stage-types'
import type { Tokens } from '../tokens'
import type { Canvas2D } from '../paint-edges'

/** One sign of the legend: drawn in a box 28 wide and 10 high whose middle is (14, 0). */
export interface LegendItem {
  readonly words: string
  readonly paint: (ctx: Canvas2D, tokens: Tokens) => void
}

/** The signs that the picture holds, in the lens that is on. */
export function legendOf({ data, chains }: StageSource, look: StageLook): LegendItem[] {
  const hidden = (kind: Parameters<NonNullable<typeof look.hiddenKinds>['has']>[0]) => look.hiddenKinds?.has(kind)
  const hasChains = chains.labels.length > 0
  const items: LegendItem[] = hasChains ? [...LENS_ITEMS[look.lens](look)] : []
  if (look.focused !== null && look.lens !== 'breaks' && !hidden('couplers'))
    items.push({ words: 'coupler carrying an interaction', paint: paintRing })
  if (look.overlay) items.push({ words: 'pointed out', paint: paintOutline })
  if (!hidden('free')) items.push({ words: hasChains ? 'free qubit' : 'qubit', paint: paintDot })
  if (data.usable.includes(0) && !hidden('missing')) items.push({ words: 'missing qubit', paint: paintSquare })
  if (data.missingCouplers?.length && !hidden('missingCouplers'))
    items.push({ words: 'missing coupler between working qubits', paint: paintDiamond })
  const { marks } = look
  if (marks && !hidden('marks') && marks.qubits.length + (marks.couplers?.length ?? 0) > 0)
    items.push({ words: marks.words, paint: paintMark })
  if (marks?.regained && !hidden('regained')) items.push({ words: marks.regained.words, paint: paintRegained })
  return items
}

const LENS_ITEMS: Record<StageLook['lens'], (look: StageLook) => LegendItem[]> = {
  occupancy: () => [{ words: 'chain, its label on the band', paint: paintBand }],
  load: () => [
    { words: 'filled from one end: coupling sum of the qubit ÷ range', paint: paintTube },
    { words: `over ${percent(SCENE_DEFAULTS.fullLoad)} %`, paint: paintFullTube },
  ],
  breaks: ({ read }) =>
    read
      ? [
          { words: 'up', paint: (ctx, tokens) => paintGlyph(ctx, tokens, 'up') },
          { words: 'down', paint: (ctx, tokens) => paintGlyph(ctx, tokens, 'down') },
          { words: 'disagree in this read', paint: paintDashes },
        ]
      : [
          {
            words: `coupler that disagreed, with its share of reads (${percent(SCENE_DEFAULTS.leastBreak).replace('.0', '')} % and over)`,
            paint: paintDashes,
          },
          { words: 'held', paint: (ctx, { edge }) => paintLine(ctx, edge, 3) },
        ],
}

function paintLine(ctx: Canvas2D, colour: string, width: number, dash: number[] = []) {
  ctx.beginPath()
  ctx.moveTo(0, 0)
  ctx.lineTo(28, 0)
  ctx.strokeStyle = colour
  ctx.lineWidth = width
  ctx.setLineDash(dash)
  ctx.stroke()
  ctx.setLineDash([])
}

const paintDashes: LegendItem['paint'] = (ctx, { clay }) => paintLine(ctx, clay, 4, [4, 3])

function paintBand(ctx: Canvas2D, { ink2 }: Tokens) {
  ctx.beginPath()
  traceBand(ctx, 4, 24, 0, 4)
  ctx.fillStyle = ink2
  ctx.fill()
}

function box(
  ctx: Canvas2D,
  [x, y, width, height]: readonly [number, number, number, number],
  fill: string,
  edge: string,
) {
  ctx.beginPath()
  ctx.rect(x, y, width, height)
  ctx.fillStyle = fill
  ctx.fill()
  ctx.strokeStyle = edge
  ctx.lineWidth = 1.1
  ctx.stroke()
}

function paintTube(ctx: Canvas2D, { paper, edge, slate }: Tokens) {
  box(ctx, [0.5, -3.5, 27, 7], paper, edge)
  ctx.fillStyle = slate
  ctx.fillRect(1, -3, 16, 6)
}

function paintFullTube(ctx: Canvas2D, { paper, ink, ochre }: Tokens) {
  box(ctx, [0.5, -3.5, 27, 7], paper, ink)
  ctx.beginPath()
  for (let x = 2; x < 22; x += 5) {
    ctx.moveTo(x, 3)
    ctx.lineTo(x + 6, -3)
  }
  ctx.strokeStyle = ochre
  ctx.lineWidth = 2
  ctx.stroke()
}

function paintGlyph(ctx: Canvas2D, { ink, paper }: Tokens, points: 'up' | 'down') {
  ctx.beginPath()
  traceTriangle(ctx, 14, points === 'up' ? 1 : -1, 5.5, points)
  ctx.fillStyle = points === 'up' ? ink : paper
  ctx.fill()
  ctx.strokeStyle = ink
  ctx.lineWidth = 1.2
  ctx.stroke()
}

function paintRing(ctx: Canvas2D, { paper, ink }: Tokens) {
  ctx.beginPath()
  ctx.moveTo(17.5, 0)
  ctx.arc(14, 0, 3.5, 0, 2 * Math.PI)
  ctx.fillStyle = paper
  ctx.fill()
  ctx.strokeStyle = ink
  ctx.lineWidth = 1.4
  ctx.stroke()
}

function paintOutline(ctx: Canvas2D, { ink }: Tokens) {
  ctx.beginPath()
  traceBand(ctx, 4, 24, 0, 4)
  ctx.strokeStyle = ink
  ctx.lineWidth = 2
  ctx.stroke()
}

function paintDot(ctx: Canvas2D, { edge }: Tokens) {
  ctx.beginPath()
  ctx.moveTo(16, 0)
  ctx.arc(14, 0, 2, 0, 2 * Math.PI)
  ctx.fillStyle = edge
  ctx.fill()
}

const paintSquare: LegendItem['paint'] = (ctx, { paper, ink2 }) => box(ctx, [10.5, -3.5, 7, 7], paper, ink2)

function paintDiamond(ctx: Canvas2D, { paper, edge }: Tokens) {
  ctx.beginPath()
  traceDiamond(ctx, 14, 0, 3.5)
  ctx.fillStyle = paper
  ctx.fill()
  ctx.strokeStyle = edge
  ctx.lineWidth = 1
  ctx.stroke()
}

function paintMark(ctx: Canvas2D, { clay }: Tokens) {
  ctx.beginPath()
  ctx.rect(8, -6, 12, 12)
  ctx.setLineDash([3, 2])
  ctx.strokeStyle = clay
  ctx.lineWidth = 1.4
  ctx.stroke()
  ctx.setLineDash([])
}

function paintRegained(ctx: Canvas2D, { leaf }: Tokens) {
  ctx.beginPath()
  ctx.moveTo(20, 0)
  ctx.arc(14, 0, 6, 0, 2 * Math.PI)
  ctx.strokeStyle = leaf
  ctx.lineWidth = 1.4
  ctx.stroke()
}
