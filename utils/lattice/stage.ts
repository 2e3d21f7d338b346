import {
  broughtIntoSight,
  centred,
  cornerBox,
  freestCorner,
  mapLongest,
  mapSize,
  revealing,
  seenBox,
  showsMost,
  zoomed,
} from './camera-moves'
import type { Corner } from './camera-moves'
import { coverageOf, coveredIn } from './coverage'
import type { Drawing } from './drawing'
import { viewOfBox, viewWithin } from './framing'
import type { Layers } from './layers'
import type { Painter } from './painter'
import type { PictureLook } from './picture'
import { RasterLayer } from './raster-layer'
import { RulerLayer } from './ruler-layer'
import { buildScene } from './scene'
import type { Scene } from './scene-types'
import type { Coverage } from './coverage'
import { TagLayer } from './tag-layer'
import { overlayOf, tagInputOf } from './tag-input'
import { tagBands } from './tag-requests'
import type { TagSeat } from './tag-requests'
import type { StageLook, StageSource } from './stage-types'
import type { Box, View } from './types'

export interface StageEvents {
  onPainted(): void
  /** The camera follows the pointer from now on. */
  onReady(): void
  /** A new map of the whole machine, the receiver's to close. */
  onMap(map: ImageBitmap): void
  onView(state: StageView): void
  /** A click or tap that was no drag, in pixels of the viewport. */
  onClick(x: number, y: number, additive: boolean): void
  onFailure(reason: string): void
}

export interface StageView {
  /** What the viewport shows, in line spacings. */
  readonly seen: Box
  /** Where a map of the machine hides least, and its longest side in pixels; null when the machine is in view anyhow. */
  readonly map: { readonly corner: Corner; readonly longest: number } | null
}

export const STAGE_DEFAULTS = {
  /** Width of the ruler in pixels. */
  inset: 24,
  /** Pixels kept free around what is fitted, and the largest line spacing it is fitted at. */
  margin: 14,
  largestFit: 30,
}

/** The layers of the lattice drawing, one on the other, and the one camera that moves them. */
export class LatticeStage {
  private readonly raster: RasterLayer
  private readonly tags: TagLayer
  private readonly ruler: RulerLayer
  private drawing: Drawing | null = null
  private source: StageSource | null = null
  private look: StageLook | null = null
  private bandsForTags: TagSeat[] = []
  private coverage: Coverage | null = null
  private size = { width: 0, height: 0 }
  /** Where the lattice lies for as long as there is no camera. */
  private held: View = { scale: 1, x: 0, y: 0 }
  private readonly drawingModule = import('./drawing')
  private isKilled = false
  private isCameraAwaited = false
  private corner: Corner = 'bottom right'

  constructor(
    private readonly layers: Layers,
    painter: Painter,
    private readonly events: StageEvents,
  ) {
    const onPainted = () => {
      events.onPainted()
      if (this.drawing || this.isCameraAwaited) return
      this.isCameraAwaited = true
      afterNextFrame(() => void this.makeCamera())
    }
    this.raster = new RasterLayer(layers.front, layers.back, painter, { ...events, onPainted })
    this.tags = new TagLayer(layers.tags)
    this.ruler = new RulerLayer(layers.rulerTop, layers.rulerLeft, STAGE_DEFAULTS.inset)
    this.measure()
  }

  get extent(): { readonly width: number; readonly height: number } {
    return this.size
  }

  /**
   * Starts on another machine or embedding. The camera is made once the picture is there: compiling its shaders takes
   * longer than painting.
   *
   * @param first box to be shown at the start; null keeps the view
   */
  begin(source: StageSource, look: StageLook, first: Box | null): void {
    const view = first ? this.fitting(first, source.bounds) : this.view()
    const hadCamera = this.drawing !== null
    const keepsCamera = hadCamera && first === null && this.source?.data === source.data
    this.source = source
    this.look = look
    this.bandsForTags = tagBands(source.geometry)
    this.coverage = source.geometry.bands.length > 0 ? coverageOf(source.geometry.bands, source.bounds) : null
    const { data, chains, hues } = source
    this.raster.of({ data, chains, hues }, source.bounds)
    this.raster.show(pictureLook(look))
    this.chooseCorner(view)
    if (keepsCamera) this.drawing?.show(this.focusScene())
    else this.dropCamera()
    this.follow(view)
    this.showTags()
    if (hadCamera && !keepsCamera) void this.makeCamera()
  }

  /** Shows the same embedding in another lens, focus, selection or filter. */
  show(look: StageLook): void {
    const before = this.look
    this.look = look
    if (!this.source) return
    if (this.drawing && before && before.tokens !== look.tokens) {
      this.dropCamera()
      void this.makeCamera()
    } else if (before?.focused !== look.focused || isOtherPicture(before, look)) this.drawing?.show(this.focusScene())
    if (!before || isOtherPicture(before, look)) this.raster.show(pictureLook(look))
    this.showTags()
  }

  /** What was in view stays in view: the camera sees to it, and where there is none yet it is done here. */
  resize(): void {
    const seen = this.size.width > 0 ? this.seen() : null
    if (!this.measure()) return
    this.drawing?.refresh()
    this.follow(this.drawing || !seen ? this.view() : viewOfBox(seen, this.size.width, this.size.height, 0))
  }

  view(): View {
    return this.drawing?.view() ?? this.held
  }

  moveTo(view: View, milliseconds = 0): void {
    if (this.drawing) this.drawing.moveTo(view, milliseconds)
    else this.follow(view)
  }

  fit(box: Box, milliseconds = 0): void {
    this.goTo(this.fitting(box), milliseconds)
  }

  reveal(box: Box, milliseconds = 0): void {
    this.goTo(revealing(this.view(), this.size, box), milliseconds)
  }

  private goTo(view: View, milliseconds: number): void {
    this.chooseCorner(view)
    this.moveTo(view, milliseconds)
    this.showTags()
  }

  /** @param parts boxes one of which must be in sight */
  bringIntoSight(parts: readonly Box[], milliseconds = 0): void {
    const view = broughtIntoSight(this.view(), this.size, parts)
    if (view) this.moveTo(view, milliseconds)
  }

  zoom(factor: number, milliseconds = 0): void {
    this.moveTo(zoomed(this.view(), factor, this.size), milliseconds)
  }

  pan(dx: number, dy: number): void {
    const { scale, x, y } = this.view()
    this.moveTo({ scale, x: x + dx, y: y + dy })
  }

  centre(at: { x: number; y: number }): void {
    this.moveTo(centred(this.view(), this.size, at))
  }

  seen(): Box {
    return seenBox(this.view(), this.size)
  }

  /** Labels are measured and placed anew, once the fonts are there. */
  refreshTags(): void {
    this.tags.forgetWidths()
    this.showTags()
    this.paintRuler(this.view())
  }

  kill(): void {
    this.isKilled = true
    this.dropCamera()
    this.raster.kill()
    this.tags.kill()
  }

  private fitting(box: Box, bounds = this.source?.bounds ?? box): View {
    const { margin, largestFit } = STAGE_DEFAULTS
    return viewWithin(box, bounds, this.size.width, this.size.height, margin, largestFit)
  }

  /** @returns whether the size has changed */
  private measure(): boolean {
    const { clientWidth: width, clientHeight: height } = this.layers.container
    // Hidden for a moment: what was in view is kept.
    if (width === 0 || height === 0) return false
    if (width === this.size.width && height === this.size.height) return false
    this.size = { width, height }
    this.raster.resize(width, height)
    this.tags.resize(width, height)
    return true
  }

  private dropCamera(): void {
    this.held = this.view()
    this.drawing?.kill()
    this.drawing = null
  }

  /** Without WebGL there is no camera to drag; keys and buttons still move the picture. */
  private async makeCamera(): Promise<void> {
    const { createDrawing } = await this.drawingModule
    if (!this.source || !this.look || this.drawing || this.isKilled) return
    try {
      this.drawing = createDrawing(this.layers.container, {
        bounds: this.source.bounds,
        tokens: this.look.tokens,
        scene: this.focusScene(),
        events: { onFrame: (next) => this.follow(next), onClick: this.events.onClick },
      })
    } catch {
      return this.events.onFailure('This browser offers no WebGL 2: the lattice moves by keys and buttons only.')
    }
    this.drawing.moveTo(this.held)
    this.events.onReady()
  }

  private focusScene(): Scene {
    const { source, look } = this
    if (!source || !look || look.focused === null) return { nodes: [], edges: [], breaks: [] }
    return buildScene({ ...source, ...look, part: 'focus' })
  }

  private follow(view: View): void {
    this.held = view
    this.raster.follow(view)
    this.tags.follow(view)
    this.paintRuler(view)
    this.events.onView({
      seen: seenBox(view, this.size),
      map: this.isMapNeeded(view) ? { corner: this.corner, longest: mapLongest(this.size) } : null,
    })
  }

  private isMapNeeded(view: View): boolean {
    return this.source !== null && !showsMost(view, this.size, this.source.bounds)
  }

  /** Puts the map where it hides least; only for a view that was asked for, so that it never moves under the pointer. */
  private chooseCorner(view: View): void {
    const { coverage, source } = this
    if (!coverage || !source) return
    const size = mapSize(source.bounds, mapLongest(this.size))
    this.corner = freestCorner(view, this.size, size, (box) => coveredIn(coverage, box))
  }

  private paintRuler(view: View): void {
    if (this.source && this.look) this.ruler.paint(view, this.size, this.source.bounds, this.look.tokens)
  }

  private showTags(): void {
    const { source, look } = this
    if (!source || !look) return
    const held = this.isMapNeeded(this.view())
      ? [cornerBox(this.corner, this.size, mapSize(source.bounds, mapLongest(this.size)))]
      : []
    const overlay = look.overlay && overlayOf(source, look.overlay)
    this.tags.show(
      { tokens: look.tokens, coverage: this.coverage, held },
      tagInputOf(source, look, this.bandsForTags),
      overlay,
    )
  }
}

/** Once what was changed is on the screen. */
function afterNextFrame(act: () => void): void {
  requestAnimationFrame(() => requestAnimationFrame(() => window.setTimeout(act)))
}

/** Without what is drawn over the picture, not in it. */
const pictureLook = ({ hovered: _, overlay: __, ...look }: StageLook): PictureLook => look

function isOtherPicture(before: StageLook | null, look: StageLook): boolean {
  if (!before) return true
  return (Object.keys(pictureLook(look)) as (keyof PictureLook)[]).some((key) => before[key] !== look[key])
}
