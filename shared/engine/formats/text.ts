/** Text as bytes: UTF-8, with or without a byte order mark. */
import { collected } from './chunks'
import { emptyReading } from './empty-reading'
import type { ProblemReading, ReadOptions } from './format'

export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)
export const textOf = (bytes: Uint8Array): string => new TextDecoder().decode(bytes)

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

/** Reads a file as one text. */
export function readAsText(
  format: string,
  chunks: Iterable<Uint8Array>,
  options: ReadOptions,
  read: (text: string, options: ReadOptions) => ProblemReading,
): ProblemReading {
  let text: string
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(collected(chunks))
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    return emptyReading(format, options, 'the file is not UTF-8 text')
  }
  return read(text, options)
}
