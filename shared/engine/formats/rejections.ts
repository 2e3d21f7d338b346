import type { RejectedLine } from './format'

const DEFAULTS = { kept: 100, textLength: 200 }

/** Databases store neither U+0000 nor the half of a character that a cut may leave. */
const storable = (text: string): string => text.replace(/\0|\p{Cs}/gu, '\uFFFD')

/** Collects rejected lines: the first 100 with their text, all of them counted. */
export class Rejections {
  readonly lines: RejectedLine[] = []
  count = 0

  add(text: string, start: number, end: number, line: number, reason: string): void {
    this.count++
    if (this.lines.length >= DEFAULTS.kept) return
    const cut = end - start > DEFAULTS.textLength
    const shown = text.slice(start, cut ? start + DEFAULTS.textLength : end)
    this.lines.push({ line, text: storable(cut ? `${shown}…` : shown), reason: storable(reason) })
  }
}
