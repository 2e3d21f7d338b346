import { coefficients } from './coefficients'
import { denseCsv } from './dense-csv'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadOptions } from './format'

const DEFAULTS = { headLength: 65_536 }

/** Every text format for problems; where two seem equally likely the earlier one is taken. */
export const FORMATS: readonly ProblemFormat[] = [coefficients, denseCsv]

/** The beginning of a text, up to the end of a line. */
function headOf(text: string): string {
  const end = text.indexOf('\n', DEFAULTS.headLength)
  return end < 0 ? text : text.slice(0, end)
}

/** The format that the text most looks like; the coefficient list when it looks like none. */
export function detectFormat(text: string): ProblemFormat {
  const head = headOf(text)
  let best = coefficients
  let bestScore = 0
  for (const format of FORMATS) {
    const score = format.sniff(head)
    if (score > bestScore) {
      best = format
      bestScore = score
    }
  }
  return best
}

function formatById(id: string): ProblemFormat {
  const format = FORMATS.find((candidate) => candidate.id === id)
  if (format) return format
  throw new RangeError(`unknown format "${id}": expected ${FORMATS.map((candidate) => candidate.id).join(' or ')}`)
}

/**
 * Reads a problem from text, in the format given or else the one detected.
 * @throws RangeError for a format that does not exist; never for what the text holds
 */
export function readProblem(text: string, options: ReadOptions & { readonly format?: string } = {}): ProblemReading {
  const { format, ...rest } = options
  return (format === undefined ? detectFormat(text) : formatById(format)).read(text, rest)
}

/**
 * Writes a problem in a format; see `ProblemFormat.write`.
 * @throws RangeError for a format that does not exist or cannot hold the problem
 */
export const writeProblem = (formatId: string, document: ProblemDocument): string =>
  formatById(formatId).write(document)
