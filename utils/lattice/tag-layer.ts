import type { Coverage } from './coverage'
import { carryTags, placeTags } from './labels'
import type { PlacedTag } from './labels'
import { boxNow, covers, isSameView, marginOf } from './painted-view'
import type { Painted } from './painted-view'
import { paintOverlay } from './paint-overlay'
import type { Overlay } from './paint-overlay'
import { paintTag } from './paint-tags'
import type { TagLook } from './paint-tags'
import { prepareCanvas } from './prepare-canvas'
import { requestTags } from './tag-requests'
import type { TagInput } from './tag-requests'
import type { Tokens } from './tokens'
import type { Box, View } from './types'

export interface TagTheme {
  readonly tokens: Tokens
  readonly coverage: Coverage | null
  /** Parts of the viewport that tags keep clear of. */
  readonly held: readonly Box[]
}

/** Pixels around the viewport that the canvas covers too: it is blended anew with every frame, so there are few. */
const CANVAS_MARGIN = 48

/**
 * Tags and outlines over the chains, placed as far around the viewport as the picture reaches. The canvas shifts with the
 * camera; where it would leave the viewport bare, and when the zoom changes, it is painted anew with every tag on its
 * spot. Once the camera rests the tags are placed anew.
 */
export class TagLayer {
  private readonly ctx: CanvasRenderingContext2D | null
  private readonly widths = new Map<string, number>()
  private size = { width: 0, height: 0 }
  private theme: TagTheme | null = null
  private input: TagInput | null = null
  private overlay: Overlay | null = null
  private placed: { readonly tags: readonly PlacedTag[]; readonly looks: readonly TagLook[] } | null = null
  private painted: Painted | null = null
  private latest: View | null = null
  private timer = 0

  constructor(private readonly canvas: HTMLCanvasElement) {
    // By the processor, as the picture: see painter.worker.
    this.ctx = canvas.getContext('2d', { willReadFrequently: true })
  }

  show(theme: TagTheme, input: TagInput, overlay: Overlay | null): void {
    this.theme = theme
    this.input = input
    this.overlay = overlay
    this.settle()
  }

  resize(width: number, height: number): void {
    this.size = { width, height }
    this.placed = null
    this.painted = null
  }

  follow(view: View): void {
    if (this.latest && this.painted && isSameView(this.latest, view)) return
    this.latest = view
    window.clearTimeout(this.timer)
    this.timer = window.setTimeout(() => this.settle(), 120)
    const { painted } = this
    const isStill = painted !== null && Math.abs(painted.view.scale - view.scale) < 1e-6 * view.scale
    if (isStill && covers(boxNow(painted, view), this.size.width, this.size.height)) this.shift()
    else this.paint()
  }

  /** Texts are measured anew, once the fonts are there. */
  forgetWidths(): void {
    this.widths.clear()
  }

  kill(): void {
    window.clearTimeout(this.timer)
  }

  /** Places all tags anew. */
  private settle(): void {
    this.placed = null
    if (this.latest) this.paint()
  }

  private shift(): void {
    if (!this.painted || !this.latest) return
    const { x1, y1 } = boxNow(this.painted, this.latest)
    this.canvas.style.transform = `translate(${x1}px, ${y1}px)`
  }

  private paint(): void {
    const { ctx, theme, latest: view } = this
    if (!ctx || !theme || !view || this.size.width === 0) return
    const [marginX, marginY] = [CANVAS_MARGIN, CANVAS_MARGIN]
    const [width, height] = [this.size.width + 2 * marginX, this.size.height + 2 * marginY]
    this.painted = { view, marginX, marginY, width, height, ratio: 1 }
    prepareCanvas(ctx, width, height)
    ctx.translate(marginX, marginY)
    if (this.overlay) paintOverlay(ctx, this.overlay, view, theme.tokens)
    this.placed ??= this.place(ctx, view, theme)
    const looks = this.placed?.looks ?? []
    for (const { key, box } of carryTags(this.placed?.tags ?? [], view).reverse())
      paintTag(ctx, looks[key]!, box, theme.tokens)
    this.shift()
  }

  private place(ctx: CanvasRenderingContext2D, view: View, { coverage, held }: TagTheme) {
    if (!this.input) return null
    const [marginX, marginY] = [marginOf(this.size.width), marginOf(this.size.height)]
    const inner = { x1: 2, y1: 2, x2: this.size.width - 2, y2: this.size.height - 2 }
    const outer = { x1: -marginX, y1: -marginY, x2: this.size.width + marginX, y2: this.size.height + marginY }
    const { requests, looks } = requestTags(ctx, this.input, this.widths, { view, viewport: outer })
    const seen = placeTags(requests, view, inner, coverage, held)
    const placedKeys = new Set(seen.map(({ key }) => key))
    const rest = requests.filter(({ key }) => !placedKeys.has(key))
    const around = placeTags(rest, view, outer, coverage, [...seen.map(({ box }) => box), inner])
    return { tags: [...seen, ...around], looks }
  }
}
