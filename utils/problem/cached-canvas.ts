import type { View } from '../lattice/types'

/**
 * A picture painted with a margin around the viewport: while the camera moves it is only shifted and stretched, and it is
 * painted anew once the camera rests or the margin is used up.
 */
export interface CachedCanvas {
  /** Paints anew, for another picture. */
  repaint(): void
  follow(view: View): void
  resize(width: number, height: number): void
  kill(): void
}

const DEFAULTS = { margin: 0.3, restMilliseconds: 110, coarsest: 0.6 }

/** @param paint draws the picture of a view into an empty canvas */
export function createCachedCanvas(
  canvas: HTMLCanvasElement,
  paint: (ctx: CanvasRenderingContext2D, view: View) => void,
): CachedCanvas {
  // Thousands of hairlines are painted quicker by the processor than by an emulated graphics card.
  const ctx = canvas.getContext('2d', { willReadFrequently: true })
  let painted: View | null = null
  let latest: View | null = null
  let size = { width: 0, height: 0 }
  let timer = 0
  const margin = () => ({ x: Math.round(size.width * DEFAULTS.margin), y: Math.round(size.height * DEFAULTS.margin) })

  function repaint() {
    window.clearTimeout(timer)
    if (!ctx || !latest || size.width === 0) return
    const ratio = Math.min(2, window.devicePixelRatio || 1)
    const width = size.width + 2 * margin().x
    const height = size.height + 2 * margin().y
    canvas.width = Math.round(width * ratio)
    canvas.height = Math.round(height * ratio)
    canvas.style.width = `${width}px`
    canvas.style.height = `${height}px`
    ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
    paint(ctx, { ...latest, x: latest.x + margin().x, y: latest.y + margin().y })
    painted = latest
    place()
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
      if (isUsedUp(view)) return repaint()
      if (!moved) return
      place()
      window.clearTimeout(timer)
      timer = window.setTimeout(repaint, DEFAULTS.restMilliseconds)
    },
    resize(width, height) {
      size = { width, height }
      painted = null
    },
    kill: () => window.clearTimeout(timer),
  }
}
