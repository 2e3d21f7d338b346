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
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadOptions } from './format'
import { DocumentReader } from './json-document'
import { JSON_KIND, JSON_VERSION } from './json-kind'
import { readJsonText } from './json-text'
import { checkLabels } from './labels'
import { formatNumber } from './numbers'
import { Rejections } from './rejections'

const ID = 'json'
const LIMITS = { bytes: 256 * 2 ** 20 }

function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const reader = new DocumentReader(readJsonText(chunks, LIMITS.bytes, 'use a coefficient list'))
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
