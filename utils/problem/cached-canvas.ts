import type { View } from '../lattice/types'

/**
 * A picture painted with a margin around the viewport: while the camera moves it is only shifted and stretched, and it is
 * painted anew once the camera rests or the margin is used up. Painting is spread over frames, so that none of them is
 * late; the earlier picture stays until the new one is whole.
 */
export interface CachedCanvas {
  /** Paints anew, for another picture. */
  repaint(): void
  follow(view: View): void
  resize(width: number, height: number): void
  kill(): void
}

const DEFAULTS = { margin: 0.3, restMilliseconds: 140, coarsest: 0.6, sliceMilliseconds: 9 }

/** Draws the picture of a view into an empty canvas, yielding where it may be interrupted. */
export type Paint = (ctx: CanvasRenderingContext2D, view: View) => Generator<undefined>

export function createCachedCanvas(canvas: HTMLCanvasElement, paint: Paint): CachedCanvas {
  const shown = canvas.getContext('2d')
  let painted: View | null = null
  let latest: View | null = null
  let size = { width: 0, height: 0 }
  let timer = 0
  const margin = () => ({ x: Math.round(size.width * DEFAULTS.margin), y: Math.round(size.height * DEFAULTS.margin) })

  const painter = createSlicedPainter(paint, (picture, view) => {
    if (!shown) return
    canvas.width = picture.width
    canvas.height = picture.height
    canvas.style.width = `${size.width + 2 * margin().x}px`
    canvas.style.height = `${size.height + 2 * margin().y}px`
    shown.drawImage(picture, 0, 0)
    painted = { ...view, x: view.x - margin().x, y: view.y - margin().y }
    place()
  })

  function repaint() {
    window.clearTimeout(timer)
    if (size.width === 0) return
    painter.ask(() => {
      const view = latest && { ...latest, x: latest.x + margin().x, y: latest.y + margin().y }
      return view && { view, width: size.width + 2 * margin().x, height: size.height + 2 * margin().y }
    })
  }

  function place() {
    if (!painted || !latest) return
    const stretch = latest.scale / painted.scale
    const x = latest.x - stretch * (painted.x + margin().x)
    const y = latest.y - stretch * (painted.y + margin().y)
    canvas.style.transform = `translate(${x}px, ${y}px) scale(${stretch})`
  }

  /** Whether the viewport would show beyond what is painted, or in too coarse a scale. */
  function isUsedUp(view: View): boolean {
    if (!painted) return true
    const stretch = view.scale / painted.scale
    const right = view.x - stretch * painted.x
    const down = view.y - stretch * painted.y
    return stretch < DEFAULTS.coarsest || Math.abs(right) > 2 * margin().x || Math.abs(down) > 2 * margin().y
  }

  return {
    repaint,
    follow(view) {
      const moved = !latest || latest.scale !== view.scale || latest.x !== view.x || latest.y !== view.y
      latest = view
      if (!moved) return
      place()
      if (isUsedUp(view)) return repaint()
      window.clearTimeout(timer)
      timer = window.setTimeout(repaint, DEFAULTS.restMilliseconds)
    },
    resize(width, height) {
      size = { width, height }
      painted = null
    },
    kill() {
      window.clearTimeout(timer)
      painter.kill()
    },
  }
}

interface Order {
  readonly view: View
  readonly width: number
  readonly height: number
}

/**
 * Paints into a canvas of its own a slice a frame, and hands it over once it is whole. What is asked for meanwhile waits
 * until then, so that pictures that change faster than they are painted are seen too.
 */
function createSlicedPainter(paint: Paint, done: (picture: HTMLCanvasElement, view: View) => void) {
  // Thousands of hairlines are painted quicker by the processor than by an emulated graphics card.
  const ctx = document.createElement('canvas').getContext('2d', { willReadFrequently: true })
  let frame = 0
  let next: (() => Order | null) | null = null

  function begin() {
    const order = next?.() ?? null
    next = null
    if (!ctx || !order) return
    const ratio = Math.min(2, window.devicePixelRatio || 1)
    ctx.canvas.width = Math.round(order.width * ratio)
    ctx.canvas.height = Math.round(order.height * ratio)
    ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
    const work = paint(ctx, order.view)
    const slice = () => {
      frame = 0
      const until = performance.now() + DEFAULTS.sliceMilliseconds
      do {
        if (!work.next().done) continue
        done(ctx.canvas, order.view)
        if (next) frame = requestAnimationFrame(restart)
        return
      } while (performance.now() < until)
      frame = requestAnimationFrame(slice)
    }
    slice()
  }
  function restart() {
    frame = 0
    begin()
  }
  return {
    ask(order: () => Order | null) {
      next = order
      if (!frame) begin()
    },
    kill: () => cancelAnimationFrame(frame),
  }
}
