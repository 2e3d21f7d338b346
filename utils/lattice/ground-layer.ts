import { paintGround } from './paint-ground'
import type { Ground } from './paint-ground'
import type { View } from './types'

/**
 * The cached picture beneath the chains. It is painted with a margin around the viewport; while the camera moves it is
 * only shifted and stretched, and it is painted anew once the camera rests or the margin is used up.
 */
export interface GroundLayer {
  give(ground: Ground): void
  follow(view: View): void
  resize(width: number, height: number): void
  kill(): void
}

export const GROUND_LAYER_DEFAULTS = {
  /** Margin on each side, as a share of the viewport. */
  margin: 0.35,
  restMilliseconds: 110,
}

/** Whether the viewport would show beyond what is painted, or in too coarse a scale. */
function isUsedUp(painted: View, view: View, margin: { x: number; y: number }): boolean {
  const stretch = view.scale / painted.scale
  return (
    stretch < 0.6 ||
    Math.abs(view.x - stretch * painted.x) > 1.5 * margin.x ||
    Math.abs(view.y - stretch * painted.y) > 1.5 * margin.y
  )
}

export function createGroundLayer(canvas: HTMLCanvasElement): GroundLayer {
  // Painted by the processor: it is quicker at thousands of hairlines than an emulated graphics card, and seldom asked.
  const ctx = canvas.getContext('2d', { willReadFrequently: true })
  let ground: Ground | null = null
  let painted: View | null = null
  let latest: View | null = null
  let size = { width: 0, height: 0 }
  let timer = 0
  const marginX = () => Math.round(size.width * GROUND_LAYER_DEFAULTS.margin)
  const marginY = () => Math.round(size.height * GROUND_LAYER_DEFAULTS.margin)

  const paint = () => {
    if (!ctx || !ground || !latest || size.width === 0) return
    const ratio = Math.min(2, window.devicePixelRatio || 1)
    const width = size.width + 2 * marginX()
    const height = size.height + 2 * marginY()
    const [pixelWidth, pixelHeight] = [Math.round(width * ratio), Math.round(height * ratio)]
    if (canvas.width !== pixelWidth) canvas.width = pixelWidth
    if (canvas.height !== pixelHeight) canvas.height = pixelHeight
    canvas.style.width = `${width}px`
    canvas.style.height = `${height}px`
    ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
    paintGround(ctx, ground, { ...latest, x: latest.x + marginX(), y: latest.y + marginY() }, width, height)
    painted = latest
    place()
  }

  const place = () => {
    if (!painted || !latest) return
    const stretch = latest.scale / painted.scale
    const x = latest.x - stretch * (painted.x + marginX())
    const y = latest.y - stretch * (painted.y + marginY())
    canvas.style.transform = `translate(${x}px, ${y}px) scale(${stretch})`
  }

  return {
    give(next) {
      ground = next
      paint()
    },
    follow(view) {
      const moved = !latest || latest.scale !== view.scale || latest.x !== view.x || latest.y !== view.y
      latest = view
      if (!painted || isUsedUp(painted, view, { x: marginX(), y: marginY() })) return paint()
      if (!moved) return
      place()
      window.clearTimeout(timer)
      timer = window.setTimeout(paint, GROUND_LAYER_DEFAULTS.restMilliseconds)
    },
    resize(width, height) {
      size = { width, height }
      painted = null
    },
    kill() {
      window.clearTimeout(timer)
    },
  }
}
