import { mapLongest, mapSize } from './camera-moves'
import { boxNow, covers, isSameView, isUsedUp, marginOf } from './painted-view'
import type { Painted } from './painted-view'
import type { Painter } from './painter'
import type { PictureLook, PictureRequest, PictureSource } from './picture'
import type { Box, View } from './types'

export interface RasterEvents {
  /** A picture arrived; the first one ends the waiting. */
  onPainted(): void
  /** A new map of the whole machine, the receiver's to close. */
  onMap(map: ImageBitmap): void
  onFailure(reason: string): void
}

export const RASTER_DEFAULTS = {
  restMilliseconds: 110,
  /** Longest side of the picture of the whole machine, in pixels. */
  overview: 900,
  /** Most device pixels to a CSS pixel. */
  largestRatio: 2,
}

const restRatio = () => Math.min(RASTER_DEFAULTS.largestRatio, window.devicePixelRatio || 1)

/**
 * The picture of the lattice. It is painted with a margin around the viewport; while the camera moves it is only shifted
 * and stretched, and it is painted anew once the camera rests or the margin is nearly used up. Beneath it lies a small
 * picture of the whole machine, so that no part of the viewport is ever empty.
 */
export class RasterLayer {
  private readonly screen: ImageBitmapRenderingContext | null
  private readonly whole: CanvasRenderingContext2D | null
  private size = { width: 0, height: 0 }
  private bounds: Box = { x1: 0, y1: 0, x2: 1, y2: 1 }
  private latest: View | null = null
  private painted: Painted | null = null
  private overview: Painted | null = null
  private isStale = true
  private isOverviewStale = true
  private isMapStale = true
  private isResting = true
  private isBusy = false
  private isOver = false
  private timer = 0

  /**
   * @param front canvas of the picture
   * @param back canvas of the whole machine, beneath it
   */
  constructor(
    private readonly front: HTMLCanvasElement,
    private readonly back: HTMLCanvasElement,
    private readonly painter: Painter,
    private readonly events: RasterEvents,
  ) {
    this.screen = front.getContext('bitmaprenderer')
    this.whole = back.getContext('2d', { alpha: false })
  }

  of(source: PictureSource, bounds: Box): void {
    this.bounds = bounds
    this.painter.of(source)
    this.isStale = this.isOverviewStale = this.isMapStale = true
  }

  show(look: PictureLook): void {
    this.painter.show(look)
    this.isStale = this.isOverviewStale = this.isMapStale = true
    void this.work()
  }

  follow(view: View): void {
    if (!this.latest || !isSameView(this.latest, view)) {
      this.isResting = this.latest === null
      this.latest = view
      this.place()
      window.clearTimeout(this.timer)
      this.timer = window.setTimeout(() => {
        this.isResting = true
        void this.work()
      }, RASTER_DEFAULTS.restMilliseconds)
    }
    void this.work()
  }

  resize(width: number, height: number): void {
    if (mapLongest({ width, height }) !== mapLongest(this.size)) this.isMapStale = true
    this.size = { width, height }
    this.isStale = true
  }

  kill(): void {
    this.isOver = true
    window.clearTimeout(this.timer)
  }

  private place(): void {
    if (!this.latest) return
    const box = this.painted && boxNow(this.painted, this.latest)
    if (box) moveTo(this.front, box)
    if (!this.overview) return
    const isCovered = box !== null && covers(box, this.size.width, this.size.height)
    this.back.style.visibility = isCovered ? 'hidden' : 'visible'
    if (!isCovered) moveTo(this.back, boxNow(this.overview, this.latest))
  }

  private isWanted(view: View): boolean {
    if (this.isStale || !this.painted) return true
    if (!this.isResting) return isUsedUp(this.painted, view, this.size.width, this.size.height)
    return !isSameView(this.painted.view, view) || this.painted.ratio !== restRatio()
  }

  /** Paints what is wanted most, one picture after the other. */
  private async work(): Promise<void> {
    if (this.isBusy || this.isOver || !this.latest || this.size.width === 0) return
    const wantsPicture = this.isWanted(this.latest)
    const wantsMap = this.isResting && (this.isOverviewStale || this.isMapStale)
    if (!wantsPicture && !wantsMap) return
    this.isBusy = true
    try {
      await (wantsPicture ? this.paintPicture(this.latest) : this.isMapStale ? this.paintMap() : this.paintOverview())
    } catch (error) {
      this.isOver = true
      this.events.onFailure(error instanceof Error ? error.message : String(error))
    }
    this.isBusy = false
    void this.work()
  }

  private async paintPicture(view: View): Promise<void> {
    const [marginX, marginY] = [marginOf(this.size.width), marginOf(this.size.height)]
    const [width, height] = [this.size.width + 2 * marginX, this.size.height + 2 * marginY]
    this.isStale = false
    const next = { view, marginX, marginY, width, height, ratio: this.isResting ? restRatio() : 1 }
    const bitmap = await this.paint(next, 'rest')
    if (this.isOver) return bitmap.close()
    this.screen?.transferFromImageBitmap(bitmap)
    this.front.style.width = `${width}px`
    this.front.style.height = `${height}px`
    this.painted = next
    this.place()
    this.events.onPainted()
  }

  private async paintOverview(): Promise<void> {
    this.isOverviewStale = false
    const next = this.wholeMachine(RASTER_DEFAULTS.overview, 1)
    const bitmap = await this.paint(next, 'whole')
    if (this.isOver) return bitmap.close()
    this.back.width = next.width
    this.back.height = next.height
    this.whole?.drawImage(bitmap, 0, 0)
    bitmap.close()
    this.overview = next
    this.place()
  }

  private async paintMap(): Promise<void> {
    this.isMapStale = false
    const bitmap = await this.paint(this.wholeMachine(mapLongest(this.size), restRatio()), 'map')
    if (this.isOver) bitmap.close()
    else this.events.onMap(bitmap)
  }

  private wholeMachine(longest: number, ratio: number): Painted {
    const { scale, width, height } = mapSize(this.bounds, longest)
    const view = { scale, x: -scale * this.bounds.x1, y: -scale * this.bounds.y1 }
    return { view, width, height, marginX: 0, marginY: 0, ratio }
  }

  private paint(painted: Painted, kind: PictureRequest['kind']): Promise<ImageBitmap> {
    const { view, marginX, marginY, width, height, ratio } = painted
    const shifted = { scale: view.scale, x: view.x + marginX, y: view.y + marginY }
    return this.painter.paint({ view: shifted, width, height, ratio, kind })
  }
}

function moveTo(canvas: HTMLCanvasElement, { x1, y1, stretch }: { x1: number; y1: number; stretch: number }): void {
  canvas.style.transform = `translate(${x1}px, ${y1}px) scale(${stretch})`
}
