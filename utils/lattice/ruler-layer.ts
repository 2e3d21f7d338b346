import { paintRulerLeft, paintRulerTop } from './paint-ruler'
import { prepareCanvas } from './prepare-canvas'
import type { Tokens } from './tokens'
import type { Box, View } from './types'

/** The map ruler along the top and the left of the frame, each on a strip of its own. */
export class RulerLayer {
  private readonly top: CanvasRenderingContext2D | null
  private readonly left: CanvasRenderingContext2D | null

  /** @param inset depth of the strips in pixels */
  constructor(
    top: HTMLCanvasElement,
    left: HTMLCanvasElement,
    private readonly inset: number,
  ) {
    // By the processor, as the picture: see painter.worker.
    this.top = top.getContext('2d', { willReadFrequently: true })
    this.left = left.getContext('2d', { willReadFrequently: true })
  }

  paint(view: View, size: { readonly width: number; readonly height: number }, limits: Box, tokens: Tokens): void {
    if (!this.top || !this.left) return
    prepareCanvas(this.top, size.width + this.inset + 2, this.inset)
    paintRulerTop(this.top, view, { extent: size.width, inset: this.inset }, limits, tokens)
    prepareCanvas(this.left, this.inset, size.height + this.inset + 2)
    paintRulerLeft(this.left, view, { extent: size.height, inset: this.inset }, limits, tokens)
  }
}
