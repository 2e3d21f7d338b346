import { chunksOf, peek, watched, type Peeked } from './chunks'
import { coefficients } from './coefficients'
import { openContainer } from './container'
import { denseCsv } from './dense-csv'
import { emptyReading } from './empty-reading'
import {
  ReadingFault,
  type FileReading,
  type Likeness,
  type ProblemDocument,
  type ProblemFormat,
  type ReadingControl,
  type ReadOptions,
} from './format'
import { json } from './json'
import { matrixMarket } from './matrix-market'
import { maxCut } from './max-cut'
import { npy } from './npy'
import { npz } from './npz'

const DEFAULTS = { headBytes: 65_536 }
const LINE_FEED = 0x0a
const FIELD_ENDS = [0x20, 0x09, 0x2c, 0x3b]

/** Every format for problems; where two seem equally likely the earlier one is taken. */
export const FORMATS: readonly ProblemFormat[] = [coefficients, denseCsv, matrixMarket, maxCut, npy, npz, json]

/** The beginning of a file, cut after a whole line or else a whole field where more follows. */
function headOf({ head, isWhole }: Peeked): Uint8Array {
  if (isWhole && head.length <= DEFAULTS.headBytes) return head
  const most = head.subarray(0, DEFAULTS.headBytes)
  const end = most.lastIndexOf(LINE_FEED)
  return most.subarray(
    0,
    end < 0 ? Math.max(...FIELD_ENDS.map((code) => most.lastIndexOf(code))) + 1 || undefined : end + 1,
  )
}

/** How much the beginning of a file looks like each format, the likeliest first; formats without any likeness left out. */
export function likenessesOf(head: Uint8Array): Likeness[] {
  return FORMATS.map((format) => ({ format: format.id, score: format.sniff(head) }))
    .filter(({ score }) => score > 0)
    .sort((a, b) => b.score - a.score)
}

/** The format that the beginning of a file most looks like; the coefficient list when it looks like none. */
export const detectFormat = (head: Uint8Array): ProblemFormat =>
  formatById(likenessesOf(head)[0]?.format ?? coefficients.id)

/** @throws RangeError for a format that does not exist */
export function formatById(id: string): ProblemFormat {
  const format = FORMATS.find((candidate) => candidate.id === id)
  if (format) return format
  const known = FORMATS.map((candidate) => candidate.id)
  throw new RangeError(`unknown format "${id}": expected ${known.slice(0, -1).join(', ')} or ${known.at(-1)}`)
}

export interface ReadProblemOptions extends ReadOptions {
  /** Identifier of a format, where it is not to be detected. */
  readonly format?: string
  readonly control?: ReadingControl
}

/**
 * Reads a problem from the bytes of a file, whole or in chunks, in the format given or else the one detected; gzip is
 * undone first.
 * @throws RangeError for a format that does not exist; never for what the bytes hold
 */
export function readProblem(
  source: Uint8Array | Iterable<Uint8Array>,
  { format: given, control, ...options }: ReadProblemOptions = {},
): FileReading {
  let format = given === undefined ? coefficients : formatById(given)
  let found: Pick<FileReading, 'likenesses' | 'container'> = { likenesses: [], container: null }
  const formatSource = given === undefined ? 'detected' : 'given'
  try {
    const opened = openContainer(watched(source instanceof Uint8Array ? chunksOf(source) : source, control))
    found = { ...found, container: opened.container }
    const peeked = peek(opened.chunks, DEFAULTS.headBytes + 1)
    const likenesses = likenessesOf(headOf(peeked))
    found = { ...found, likenesses }
    format = formatById(given ?? likenesses[0]?.format ?? coefficients.id)
    return { ...format.read(peeked.chunks, options), formatSource, ...found, isReadToEnd: true }
  } catch (error) {
    if (!(error instanceof ReadingFault)) throw error
    return { ...emptyReading(format.id, options, error.message), formatSource, ...found, isReadToEnd: false }
  }
}

/**
 * Writes a problem in a format; see `ProblemFormat.write`.
 * @throws RangeError for a format that does not exist or cannot hold the problem
 */
export const writeProblem = (formatId: string, document: ProblemDocument): Uint8Array =>
  formatById(formatId).write(document)
