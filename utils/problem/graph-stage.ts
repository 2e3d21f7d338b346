import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'
import { createCachedCanvas } from './cached-canvas'
import { createGraphDrawing } from './graph-drawing'
import type { GraphDrawing } from './graph-drawing'
import { paintLabels } from './graph-label-paint'
import type { GraphLabels } from './graph-label-paint'
import { lookOfLines, paintLines } from './graph-lines'
import type { GraphLines } from './graph-lines'
import { isPaintedWithLines, marksOf, paintMarks, shrinkOf } from './graph-marks'
import type { MarksInput } from './graph-marks'

/** The layers of the drawing from the ground up: all lines, those of the focus, the marks, the labels. */
export interface StageElements {
  readonly lines: HTMLCanvasElement
  readonly near: HTMLCanvasElement
  readonly marks: HTMLElement
  readonly labels: HTMLCanvasElement
}

export interface GraphPicture {
  readonly lines: GraphLines
  /** Interactions of the variables in focus and under the pointer, drawn over the others. */
  readonly near: readonly number[]
  readonly marks: MarksInput
  readonly labels: GraphLabels
}

export interface GraphStage {
  give(picture: GraphPicture): void
  view(): View
  moveTo(view: View, milliseconds?: number): void
  size(): { width: number; height: number }
  resize(): void
  kill(): void
}

/** Opacity of all lines while one variable is in focus. */
const DIMMED = '0.14'

/** @throws Error when the browser offers no WebGL 2 */
export function createGraphStage(
  elements: StageElements,
  tokens: Tokens,
  onClick: (x: number, y: number, isAdditive: boolean) => void,
): GraphStage {
  let picture: GraphPicture | null = null
  const size = { width: elements.marks.clientWidth, height: elements.marks.clientHeight }

  const all = createCachedCanvas(elements.lines, function* (ctx, view) {
    if (!picture) return
    const { lines, marks } = picture
    yield* paintLines(ctx, lines, view, lookOfLines(lines.interactions.length, tokens, shrinkOf(marks.steps.length)))
    if (isPaintedWithLines(marks)) yield* paintMarks(ctx, marks, view, drawing.growth())
  })
  const near = canvasOfViewport(elements.near, size)
  const labels = canvasOfViewport(elements.labels, size)

  function onFrame(view: View) {
    if (!picture) return
    all.follow(view)
    const { lines, near: interactions } = picture
    const look = { tokens, thickness: 1, dashed: true, opacity: 1 }
    elements.near.style.visibility = interactions.length > 0 ? 'visible' : 'hidden'
    if (interactions.length > 0) near((ctx) => Array.from(paintLines(ctx, { ...lines, interactions }, view, look)))
    labels((ctx) => paintLabels(ctx, picture!.labels, { view, ...size, tokens }))
  }

  const drawing: GraphDrawing = createGraphDrawing(elements.marks, tokens, { onFrame, onClick })
  all.resize(size.width, size.height)

  return {
    give(next) {
      const isSame = picture !== null && isSamePainting(picture, next)
      picture = next
      elements.lines.style.opacity = next.marks.focused === null ? '1' : DIMMED
      drawing.show(marksOf(next.marks, isPaintedWithLines(next.marks) ? 'raised' : 'all'))
      if (!isSame) all.repaint()
      onFrame(drawing.view())
    },
    view: () => drawing.view(),
    moveTo: (view, milliseconds) => drawing.moveTo(view, milliseconds),
    size: () => size,
    resize() {
      const { clientWidth, clientHeight } = elements.marks
      if (clientWidth === 0 || clientHeight === 0) return
      if (clientWidth === size.width && clientHeight === size.height) return
      size.width = clientWidth
      size.height = clientHeight
      all.resize(clientWidth, clientHeight)
      drawing.refresh()
      onFrame(drawing.view())
    },
    kill() {
      all.kill()
      drawing.kill()
    },
  }
}

/** Whether the lines are the same, and with them the marks: what hides or measures one does so with the other. */
const isSamePainting = ({ lines: a, marks: { steps } }: GraphPicture, { lines: b, marks }: GraphPicture): boolean =>
  a.positions === b.positions && a.steps === b.steps && a.interactions === b.interactions && steps === marks.steps

/** Paints into a canvas as large as the viewport, cleared and sharp. */
function canvasOfViewport(canvas: HTMLCanvasElement, size: { readonly width: number; readonly height: number }) {
  const ctx = canvas.getContext('2d')
  return (paint: (ctx: CanvasRenderingContext2D) => unknown) => {
    if (!ctx || size.width === 0) return
    const ratio = Math.min(2, window.devicePixelRatio || 1)
    const [width, height] = [Math.round(size.width * ratio), Math.round(size.height * ratio)]
    if (canvas.width !== width) canvas.width = width
    if (canvas.height !== height) canvas.height = height
    canvas.style.width = `${size.width}px`
    canvas.style.height = `${size.height}px`
    ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
    ctx.clearRect(0, 0, size.width, size.height)
    paint(ctx)
  }
}
