/** Text as bytes: UTF-8, with or without a byte order mark. */
import { eachLine } from './blocks'
import { ReadingFault } from './format'

const encoder = new TextEncoder()
const decoder = new TextDecoder()

export const bytesOf = (text: string): Uint8Array => encoder.encode(text)
export const textOf = (bytes: Uint8Array): string => decoder.decode(bytes)

/** Whether the beginning of a file is text; half a character at its end is no fault. */
export function holdsText(head: Uint8Array): boolean {
  if (head.includes(0)) return false
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(head, { stream: true })
    return true
  } catch {
    return false
  }
}

/** Decodes lines one at a time. */
export class LineDecoder {
  private readonly strict = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true })

  /** @throws ReadingFault for bytes that are no UTF-8 */
  decode(bytes: Uint8Array, start: number, end: number, line: number): string {
    try {
      return this.strict.decode(bytes.subarray(start, end))
    } catch {
      throw new ReadingFault(`line ${line} is not UTF-8 text: save the file as UTF-8`, line)
    }
  }
}

/** Visits each line of the beginning of a file as text. */
export function eachTextLine(head: Uint8Array, visit: (text: string, line: number) => void): void {
  eachLine([head], (bytes, start, end, line) => visit(textOf(bytes.subarray(start, end)), line))
}
