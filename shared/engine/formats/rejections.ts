import type { RejectedLine } from './format'

const DEFAULTS = { kept: 100, textLength: 200 }

/** Collects rejected lines: the first 100 with their text, all of them counted. */
export class Rejections {
  readonly lines: RejectedLine[] = []
  count = 0

  add(text: string, start: number, end: number, line: number, reason: string): void {
    this.count++
    if (this.lines.length >= DEFAULTS.kept) return
    const shown = text.slice(start, Math.min(end, start + DEFAULTS.textLength))
    this.lines.push({ line, text: end - start > DEFAULTS.textLength ? `${shown}…` : shown, reason })
  }
}
