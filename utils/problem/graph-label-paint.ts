import { TAG_FONT } from '../lattice/paint-tags'
import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'
import { placeLabels } from './graph-labels'
import type { LabelRequest, Obstacle } from './graph-labels'

export interface GraphLabels {
  readonly positions: Float32Array
  readonly texts: readonly string[]
  /** Variables in the order in which their labels are placed; those that matter most come first. */
  readonly order: readonly number[]
  /** The first so many are placed even where they cover others. */
  readonly insisting: number
  /** The first so many are shown in a crowd as well. */
  readonly ranked: number
  readonly focused: number | null
  /** Radius of the largest marks, in pixels at the scale that shows all. */
  readonly radius: number
  readonly isHidden: (variable: number) => boolean
}

/** Most labels that ask for a place in one frame. */
const MOST = 160
/** Marks in sight up to which labels keep off them; among more, only labels of the focus and its partners are shown. */
const MOST_OBSTACLES = 700
const SIZE = { focus: 13, plain: 11 }

export interface LabelFrame {
  readonly view: View
  readonly width: number
  readonly height: number
  readonly tokens: Tokens
}

/** Labels of the variables in sight, as many as find room, on a shade of paper. */
export function paintLabels(ctx: CanvasRenderingContext2D, labels: GraphLabels, frame: LabelFrame): void {
  const { view, width, height, tokens } = frame
  const requests: (LabelRequest & { readonly variable: number })[] = []
  const obstacles = marksInSight(labels, frame)
  const isCrowded = obstacles.length > MOST_OBSTACLES
  for (const [rank, variable] of labels.order.entries()) {
    if (requests.length >= MOST || (isCrowded && rank >= labels.ranked)) break
    const x = view.x + view.scale * labels.positions[2 * variable]!
    const y = view.y + view.scale * labels.positions[2 * variable + 1]!
    if (x < 0 || y < 0 || x > width || y > height) continue
    const isFocus = variable === labels.focused
    ctx.font = fontOf(isFocus)
    const text = labels.texts[variable]!
    requests.push({
      variable,
      text,
      x,
      y,
      radius: labels.radius + (isFocus ? 5 : 0),
      width: Math.ceil(ctx.measureText(text).width) + 4,
      height: isFocus ? 18 : 14,
      insists: rank < labels.insisting,
    })
  }
  ctx.textBaseline = 'middle'
  for (const { request, x, y } of placeLabels(requests, width, height, isCrowded ? [] : obstacles)) {
    const isFocus = 'variable' in request && request.variable === labels.focused
    ctx.globalAlpha = 0.82
    ctx.fillStyle = tokens.paper
    ctx.fillRect(x, y, request.width, request.height)
    ctx.globalAlpha = 1
    ctx.fillStyle = tokens.ink
    ctx.font = fontOf(isFocus)
    ctx.fillText(request.text, x + 2, y + request.height / 2 + 0.5)
  }
}

function marksInSight({ positions, radius, isHidden }: GraphLabels, { view, width, height }: LabelFrame): Obstacle[] {
  const found: Obstacle[] = []
  for (let i = 0; 2 * i < positions.length; i++) {
    const x = view.x + view.scale * positions[2 * i]!
    const y = view.y + view.scale * positions[2 * i + 1]!
    if (x < 0 || y < 0 || x > width || y > height || isHidden(i)) continue
    found.push({ x, y, radius })
  }
  return found
}

const fontOf = (isFocus: boolean): string =>
  `${isFocus ? 600 : 400} ${isFocus ? SIZE.focus : SIZE.plain}px ${TAG_FONT.family}`
