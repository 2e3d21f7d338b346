import { collected } from './chunks'
import { ReadingFault } from './format'

const LIMITS = { messageLength: 200, shownLength: 40 }

function* withinLimit(chunks: Iterable<Uint8Array>, limit: number, instead: string): Generator<Uint8Array> {
  let bytes = 0
  for (const chunk of chunks) {
    bytes += chunk.length
    if (bytes > limit) throw new ReadingFault(`a JSON document may be ${limit / 2 ** 20} MiB long: ${instead}`)
    yield chunk
  }
}

/**
 * The JSON document of a file, whatever it holds.
 * @param limit of its bytes
 * @param instead what to do with a longer one
 * @throws ReadingFault when it is longer, or no JSON in UTF-8
 */
export function readJsonText(chunks: Iterable<Uint8Array>, limit: number, instead: string): unknown {
  const bytes = collected(withinLimit(chunks, limit, instead))
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch (error) {
    if (error instanceof TypeError) throw new ReadingFault('the file is not UTF-8 text: save it as UTF-8')
    const reason = error instanceof Error ? error.message.slice(0, LIMITS.messageLength) : 'unknown reason'
    throw new ReadingFault(`the file is not valid JSON: ${reason}`)
  }
}

/** A value as it stands in the file, cut to a readable length. */
export function shownJson(value: unknown): string {
  const text = JSON.stringify(value) ?? 'nothing'
  return text.length > LIMITS.shownLength ? `${text.slice(0, LIMITS.shownLength)}…` : text
}
