/**
 * The house's own format: a JSON document, described by the JSON Schema `docs/problem.schema.json`, which is also served
 * at `/api/schemas/problem.json`. `kind`, `version` and `form` are needed, all else may be left out:
 *
 *     { "kind": "espalier.problem", "version": 1, "form": "qubo", "sense": "min", "convention": "plus", "offset": 0,
 *       "variables": ["a", "b"], "linear": [["a", 1.5]], "interactions": [["a", "b", -2]] }
 *
 * Labels are texts or whole numbers. `variables` states all of them in order; without it they are those that are named,
 * in numerical order when all are integers, else in order of first appearance.
 */
import { negateProblem } from '../problem/negate'
import { assembleReading } from './assemble'
import { collected } from './chunks'
import { ReadingFault, type ProblemDocument, type ProblemFormat, type ProblemReading, type ReadOptions } from './format'
import { DocumentReader } from './json-document'
import { JSON_KIND, JSON_VERSION } from './json-kind'
import { checkLabels } from './labels'
import { formatNumber } from './numbers'
import { Rejections } from './rejections'

const ID = 'json'
const LIMITS = { bytes: 256 * 2 ** 20, messageLength: 200 }

function* withinLimit(chunks: Iterable<Uint8Array>): Generator<Uint8Array> {
  let bytes = 0
  for (const chunk of chunks) {
    bytes += chunk.length
    if (bytes > LIMITS.bytes)
      throw new ReadingFault(`a JSON document may be ${LIMITS.bytes / 2 ** 20} MiB long: use a coefficient list`)
    yield chunk
  }
}

/** The document, whatever it holds. @throws ReadingFault when the bytes are no JSON in UTF-8 */
function parse(bytes: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch (error) {
    if (error instanceof TypeError) throw new ReadingFault('the file is not UTF-8 text: save it as UTF-8')
    const reason = error instanceof Error ? error.message.slice(0, LIMITS.messageLength) : 'unknown reason'
    throw new ReadingFault(`the file is not valid JSON: ${reason}`)
  }
}

function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const reader = new DocumentReader(parse(collected(withinLimit(chunks))))
  reader.read()
  const { labels, terms, directives, issues } = reader
  const gathered = { format: ID, labels, ...terms, isMatrix: false, directives }
  return assembleReading({ ...gathered, header: null, rejections: new Rejections(), issues }, options)
}

const listOf = (lines: readonly string[]): string => (lines.length > 0 ? `[\n${lines.join(',\n')}\n  ]` : '[]')

/** Writes one coefficient a line, only those that are not zero. */
function write({ form, labels, problem, sense }: ProblemDocument): Uint8Array {
  checkLabels(labels, problem.n)
  const isMax = sense === 'max'
  const { linear, rows, cols, values, offset } = negateProblem(problem, { coefficients: isMax, offset: isMax })
  const names = labels.map((label) => JSON.stringify(label))
  const own: string[] = []
  linear.forEach((value, i) => {
    if (value !== 0) own.push(`    [${names[i]}, ${formatNumber(value)}]`)
  })
  const pairs = Array.from(values, (value, k) => `    [${names[rows[k]!]}, ${names[cols[k]!]}, ${formatNumber(value)}]`)
  const members = [
    `"kind": "${JSON_KIND}"`,
    `"version": ${JSON_VERSION}`,
    `"form": "${form}"`,
    `"sense": "${sense}"`,
    `"offset": ${formatNumber(offset)}`,
    `"variables": ${listOf(names.map((name) => `    ${name}`))}`,
    `"linear": ${listOf(own)}`,
    `"interactions": ${listOf(pairs)}`,
  ]
  return new TextEncoder().encode(`{\n  ${members.join(',\n  ')}\n}\n`)
}

/** Nothing else begins with a brace; the kind makes it certain. */
function sniff(head: Uint8Array): number {
  const text = new TextDecoder().decode(head.subarray(0, 1024))
  if (!/^\s*\{/.test(text)) return 0
  return text.includes(`"${JSON_KIND}"`) ? 1 : 0.9
}

export const json: ProblemFormat = {
  id: ID,
  title: 'JSON document',
  extensions: ['json'],
  mediaType: 'application/json',
  sniff,
  read,
  write,
}
