import type { Canvas2D } from '../paint-edges'
import { at, createSvgPath } from './svg-path'

/**
 * A canvas that writes SVG: what paints the lattice on the screen paints it here, so that file and screen are the same
 * drawing. It knows what the painters of the lattice use of a canvas, no more.
 */
export interface SvgCanvas {
  /** To be given to a painter. */
  readonly ctx: Canvas2D & CanvasRenderingContext2D
  /** Puts what is painted meanwhile into a group with an id. */
  group(id: string, paint: () => void): void
  /** The document (SVG 1.1). */
  document(): string
}

export interface SvgHead {
  readonly width: number
  readonly height: number
  readonly title: string
  readonly description: string
}

interface Pen {
  fillStyle: string | SvgPattern
  strokeStyle: string
  lineWidth: number
  lineCap: string
  globalAlpha: number
  font: string
  textAlign: string
  textBaseline: string
  dash: number[]
  /** Groups that this level of saving opened. */
  open: number
  /** Movements of the origin as SVG transforms. */
  transform: string
}

interface SvgPattern {
  readonly id: string
  setTransform(): void
}

const FRESH_PEN: Pen = {
  fillStyle: '#000000',
  strokeStyle: '#000000',
  lineWidth: 1,
  lineCap: 'butt',
  globalAlpha: 1,
  font: '400 10px sans-serif',
  textAlign: 'start',
  textBaseline: 'alphabetic',
  dash: [],
  open: 0,
  transform: '',
}

/** Height of the middle of letters over the base line, as a share of the size. */
const MIDDLE = 0.35
/** Advance of a letter as a share of the size: that of the mono face is exact. */
const ADVANCE = { mono: 0.6, sans: 0.53 }
const ANCHORS: Record<string, string> = { center: 'middle', right: 'end', end: 'end' }

export function createSvgCanvas(head: SvgHead): SvgCanvas {
  const lines: Line[] = []
  const canvas = new SvgPen(lines)
  return {
    // The painters take any canvas; this one has what they call.
    ctx: canvas as unknown as SvgCanvas['ctx'],
    group(id, paint) {
      lines.push(`<g id="${escapeXml(id)}">`)
      paint()
      lines.push('</g>')
    },
    document() {
      const size = `width="${at(head.width)}" height="${at(head.height)}"`
      return [
        '<?xml version="1.0" encoding="UTF-8"?>',
        `<svg xmlns="http://www.w3.org/2000/svg" ${size} viewBox="0 0 ${at(head.width)} ${at(head.height)}" role="img" aria-labelledby="title description">`,
        `<title id="title">${escapeXml(head.title)}</title>`,
        `<desc id="description">${escapeXml(head.description)}</desc>`,
        ...lines,
        '</svg>\n',
      ].join('\n')
    },
  }
}

/** Text for XML; characters that it cannot hold are left out. */
export function escapeXml(text: string): string {
  const named: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' }
  return [...text].map((c) => named[c] ?? (c < ' ' || c === '\ufffe' || c === '\uffff' ? '' : c)).join('')
}

/** An element, written out when the document is. */
type Line = string | Rectangles

class Rectangles {
  readonly path = createSvgPath()

  constructor(readonly look: string) {}

  toString(): string {
    return `<path d="${this.path.data()}"${this.look}/>`
  }
}

class SvgPen {
  private pen: Pen = { ...FRESH_PEN }
  private readonly saved: Pen[] = []
  private path = createSvgPath()
  private made = 0
  /** The rectangles written last. */
  private run: Rectangles | null = null

  constructor(private readonly lines: Line[]) {}

  set fillStyle(style: Pen['fillStyle']) {
    this.pen.fillStyle = style
  }
  set strokeStyle(style: string) {
    this.pen.strokeStyle = style
  }
  set lineWidth(width: number) {
    this.pen.lineWidth = width
  }
  set lineCap(cap: string) {
    this.pen.lineCap = cap
  }
  set globalAlpha(alpha: number) {
    this.pen.globalAlpha = alpha
  }
  set font(font: string) {
    this.pen.font = font
  }
  set textAlign(align: string) {
    this.pen.textAlign = align
  }
  set textBaseline(line: string) {
    this.pen.textBaseline = line
  }
  setLineDash(dash: number[]): void {
    this.pen.dash = dash
  }

  save(): void {
    this.saved.push(this.pen)
    this.pen = { ...this.pen, open: 0 }
  }
  restore(): void {
    for (let k = 0; k < this.pen.open; k++) this.lines.push('</g>')
    this.pen = this.saved.pop() ?? { ...FRESH_PEN }
  }
  translate(x: number, y: number): void {
    this.pen.transform += `translate(${at(x)} ${at(y)})`
  }
  rotate(angle: number): void {
    this.pen.transform += `rotate(${at((180 * angle) / Math.PI)})`
  }
  clip(): void {
    const id = `clip-${++this.made}`
    this.lines.push(`<clipPath id="${id}"><path d="${this.path.data()}"${this.placing()}/></clipPath>`)
    this.lines.push(`<g clip-path="url(#${id})">`)
    this.pen.open++
  }

  beginPath(): void {
    this.path = createSvgPath()
  }
  moveTo(x: number, y: number): void {
    this.path.moveTo(x, y)
  }
  lineTo(x: number, y: number): void {
    this.path.lineTo(x, y)
  }
  rect(x: number, y: number, width: number, height: number): void {
    this.path.rect(x, y, width, height)
  }
  arc(x: number, y: number, radius: number, from: number, to: number): void {
    this.path.arc(x, y, radius, from, to)
  }
  closePath(): void {
    this.path.closePath()
  }

  fill(): void {
    this.put(this.path.data(), ` fill="${this.paintOf(this.pen.fillStyle)}"`)
  }
  stroke(): void {
    const { strokeStyle, lineWidth, lineCap, dash } = this.pen
    const ends = lineCap === 'butt' ? '' : ` stroke-linecap="${lineCap}"`
    const dashes = dash.length === 0 ? '' : ` stroke-dasharray="${dash.map(at).join(' ')}"`
    this.put(this.path.data(), ` fill="none" stroke="${strokeStyle}" stroke-width="${at(lineWidth)}"${ends}${dashes}`)
  }
  /** Rectangles of one look that follow one another become one element. */
  fillRect(x: number, y: number, width: number, height: number): void {
    const look = ` fill="${this.paintOf(this.pen.fillStyle)}"${this.placing()}`
    if (!this.run || this.run !== this.lines.at(-1) || this.run.look !== look) {
      this.run = new Rectangles(look)
      this.lines.push(this.run)
    }
    this.run.path.rect(x, y, width, height)
  }
  strokeRect(x: number, y: number, width: number, height: number): void {
    const kept = this.path
    this.path = createSvgPath()
    this.path.rect(x, y, width, height)
    this.stroke()
    this.path = kept
  }

  /** The hatching of a full tube: lines of the colour that the tile was drawn with. */
  createPattern(tile: HTMLCanvasElement | OffscreenCanvas): SvgPattern {
    const id = `hatching-${++this.made}`
    const drawn = tile.getContext('2d') as Canvas2D | null
    const colour = typeof drawn?.strokeStyle === 'string' ? drawn.strokeStyle : '#000000'
    const slanting = `<path d="M-1 1L1 -1M0 5L5 0M4 6L6 4" stroke="${colour}" stroke-width="2"/>`
    this.lines.push(`<pattern id="${id}" width="5" height="5" patternUnits="userSpaceOnUse">${slanting}</pattern>`)
    return { id, setTransform: () => undefined }
  }

  measureText(text: string): { width: number } {
    const { size, isMono } = fontOf(this.pen.font)
    return { width: [...text].length * size * ADVANCE[isMono ? 'mono' : 'sans'] }
  }
  fillText(text: string, x: number, y: number): void {
    const { font, textAlign, textBaseline, fillStyle } = this.pen
    const { weight, size, family, isMono } = fontOf(font)
    const base = textBaseline === 'middle' ? y + MIDDLE * size : y
    const anchor = ANCHORS[textAlign] ? ` text-anchor="${ANCHORS[textAlign]}"` : ''
    const width = isMono ? ` textLength="${at(this.measureText(text).width)}" lengthAdjust="spacingAndGlyphs"` : ''
    this.lines.push(
      `<text x="${at(x)}" y="${at(base)}" font-family="${escapeXml(family)}" font-size="${at(size)}" font-weight="${weight}"${anchor}${width} fill="${String(fillStyle)}"${this.placing()}>${escapeXml(text)}</text>`,
    )
  }

  private paintOf(style: Pen['fillStyle']): string {
    return typeof style === 'string' ? style : `url(#${style.id})`
  }
  private put(data: string, look: string): void {
    if (data) this.lines.push(`<path d="${data}"${look}${this.placing()}/>`)
  }
  private placing(): string {
    const { transform, globalAlpha } = this.pen
    const opacity = globalAlpha === 1 ? '' : ` opacity="${at(globalAlpha)}"`
    return (transform ? ` transform="${transform}"` : '') + opacity
  }
}

/**
 * The file is read where our fonts may be missing: what comes close follows, and the mono face keeps its width by
 * `textLength`, so that no label grows out of its tag.
 */
const FAMILIES = {
  mono: "'IBM Plex Mono', ui-monospace, 'DejaVu Sans Mono', Menlo, Consolas, monospace",
  sans: "'IBM Plex Sans', system-ui, 'Segoe UI', Helvetica, Arial, sans-serif",
}

/** Weight, size in pixels and families of a canvas font such as `600 13px "IBM Plex Mono", monospace`. */
function fontOf(font: string): { weight: string; size: number; family: string; isMono: boolean } {
  const [, weight = '400', size = '10', family = 'sans-serif'] = /^(\d+) ([\d.]+)px (.*)$/.exec(font) ?? []
  const isMono = /mono/i.test(family)
  return { weight, size: Number(size), family: FAMILIES[isMono ? 'mono' : 'sans'], isMono }
}
