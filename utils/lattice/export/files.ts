import type { DrawnLattice, Extent } from './layout'
import { savedPicture } from './picture'
import type { PictureWords } from './picture'
import { createSvgCanvas } from './svg-canvas'

export type PictureFormat = 'svg' | 'png'

export const PNG_DEFAULTS = {
  /** Pixels of the file for each pixel of the picture. */
  ratio: 2,
  /** Longest side that every browser paints. */
  longestSide: 16_384,
}

export function svgOf(drawn: DrawnLattice, extent: Extent, words: PictureWords): string {
  const { layout, paint } = savedPicture(drawn, extent, words)
  const svg = createSvgCanvas({
    width: layout.width,
    height: layout.height,
    title: words.title,
    description: words.lines.join(' '),
  })
  paint(svg.ctx, svg.group)
  return svg.document()
}

/** @throws Error where the browser cannot hold a canvas of that size */
export async function pngOf(drawn: DrawnLattice, extent: Extent, words: PictureWords): Promise<Blob> {
  const { layout, paint } = savedPicture(drawn, extent, words)
  const { ratio, longestSide } = PNG_DEFAULTS
  const canvas = document.createElement('canvas')
  canvas.width = Math.ceil(ratio * layout.width)
  canvas.height = Math.ceil(ratio * layout.height)
  const ctx = canvas.getContext('2d')
  if (!ctx || Math.max(canvas.width, canvas.height) > longestSide)
    throw new Error('The picture is too large for this browser. Save it as SVG instead.')
  ctx.scale(ratio, ratio)
  paint(ctx)
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'))
  if (!blob) throw new Error('This browser could not write the picture. Save it as SVG instead.')
  return blob
}

/** A file name that says what the picture shows, safe on every system: `E-4-deck-radio-on-alder-load-whole-machine.svg`. */
export function pictureFileName(parts: readonly string[], format: PictureFormat): string {
  const slug = parts
    .join(' ')
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
  return `${slug.slice(0, 120)}.${format}`
}
