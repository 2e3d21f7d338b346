/**
 * Max-cut edge list, as the published sets of graphs are written: a line with the numbers of vertices and edges, then
 * `i j weight` or `i j` for each edge, vertices counted from 1.
 *
 * The cut is maximised: Σ w (x_i + x_j − 2 x_i x_j) over x ∈ {0, 1}, or Σ w (1 − s_i s_j) / 2 over spins when it is asked
 * for as an Ising model, so that the value shown is the weight of the cut. (The formulation is that of F. Barahona,
 * M. Grötschel, M. Jünger & G. Reinelt, Oper. Res. 36, 1988, from memory.)
 */
import { buildProblem } from '../problem/build'
import { exactSum } from '../problem/exact-sum'
import { negateProblem } from '../problem/negate'
import type { Form } from '../problem/problem'
import { assembleReading, firstRowsOf } from './assemble'
import { MAX_STATED_VARIABLES } from './counted'
import { Entries } from './entries'
import type { ProblemDocument, ProblemFormat, ProblemReading, ReadingIssue, ReadOptions } from './format'
import { MaxCutReader, readGraphSize } from './max-cut-reader'
import { isNumbered } from './numbered-names'
import { formatNumber } from './numbers'
import { bytesOf, eachTextLine, holdsText } from './text'
import { triangleOf } from './triangle'

const ID = 'max-cut'
const DEFAULTS = { linesSniffed: 300, wholeBytes: 32_768 }
const LIKENESS = { sure: 0.9, cutShort: 0.4 }

type Edges = ReturnType<Entries['terms']>

/** The coefficients whose value is the weight of the cut. */
function termsOf({ rows, cols, values }: Edges, form: Form): Edges {
  if (form === 'ising') return { rows, cols, values: values.map((weight) => -weight / 2) }
  const terms = new Entries()
  for (let k = 0; k < values.length; k++) {
    const [i, j, weight] = [rows[k]!, cols[k]!, values[k]!]
    terms.add(i, i, weight)
    terms.add(j, j, weight)
    terms.add(i, j, -2 * weight)
  }
  return terms.terms()
}

function conventionIssues({ convention }: ReadOptions): ReadingIssue[] {
  if (convention !== 'minus') return []
  return [{ message: 'an edge list holds weights and no coefficients, so it has no convention: leave it to the file' }]
}

/** Reads an edge list; see the head of this file. */
function read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading {
  const reader = new MaxCutReader()
  reader.read(chunks)
  const n = reader.size?.n ?? 0
  const labels = Array.from({ length: n }, (_, i) => String(i + 1))
  const edges = reader.edges.terms()
  const form = options.form ?? 'qubo'
  const half = form === 'ising' ? exactSum(edges.values) / 2 : 0
  return assembleReading(
    {
      format: ID,
      labels,
      ...termsOf(edges, form),
      isMatrix: false,
      directives: { form: 'qubo', sense: 'max', offset: half },
      header: null,
      rejections: reader.rejections,
      issues: [...reader.issues, ...conventionIssues(options)],
      known: {
        triangle: triangleOf(n, edges),
        duplicatesSummed: buildProblem(n, edges, 0).duplicatesSummed,
        firstRows: firstRowsOf({ labels, ...edges }),
        entriesRead: edges.values.length,
      },
    },
    { ...options, convention: 'plus' },
  )
}

/** Whether the coefficients, to be maximised, are those of a cut: each linear one the sum of its edges' weights. */
function isCut({ n, linear, rows, cols, values, offset }: ProblemDocument['problem']): boolean {
  const weights = Array.from({ length: n }, (): number[] => [])
  for (let k = 0; k < values.length; k++) {
    weights[rows[k]!]!.push(-values[k]! / 2)
    weights[cols[k]!]!.push(-values[k]! / 2)
  }
  return offset === 0 && weights.every((around, i) => exactSum(around) === linear[i])
}

function write({ form, labels, problem, sense }: ProblemDocument): Uint8Array {
  const stated = negateProblem(problem, { coefficients: true, offset: true })
  if (form !== 'qubo' || sense !== 'max' || !isCut(stated))
    throw new RangeError('only the QUBO form of a cut to be maximised can be written as an edge list')
  if (!isNumbered(labels)) throw new RangeError('an edge list numbers its vertices from 1: the labels would be lost')
  if (problem.n === 0 || problem.n > MAX_STATED_VARIABLES)
    throw new RangeError(`an edge list has 1 … ${MAX_STATED_VARIABLES} vertices here, not ${problem.n}`)
  const lines = [`${stated.n} ${stated.values.length}`]
  for (let k = 0; k < stated.values.length; k++)
    lines.push(`${stated.rows[k]! + 1} ${stated.cols[k]! + 1} ${formatNumber(-stated.values[k]! / 2)}`)
  return bytesOf(`${lines.join('\n')}\n`)
}

/** Two numbers and then edges within them; less sure where edges are missing though the file seems to be there in full. */
function sniff(head: Uint8Array): number {
  if (!holdsText(head)) return 0
  let size: ReturnType<typeof readGraphSize> | undefined
  let edges = 0
  let others = 0
  eachTextLine(head, (text) => {
    if (size === null || others > 0 || text.trim() === '' || text.trimStart().startsWith('#')) return
    if (size === undefined) {
      size = readGraphSize(text)
      return
    }
    if (++edges > DEFAULTS.linesSniffed) return
    const match = /^\s*(\d{1,15})\s+(\d{1,15})(?:\s+[-+.\deE]+)?\s*$/.exec(text)
    const isWithin = match?.slice(1, 3).every((vertex) => Number(vertex) >= 1 && Number(vertex) <= size!.n)
    if (!isWithin) others++
  })
  if (!size || others > 0 || edges > size.m) return 0
  if (edges === 0) return size.m === 0 ? LIKENESS.cutShort : 0
  return edges < size.m && head.length < DEFAULTS.wholeBytes ? LIKENESS.cutShort : LIKENESS.sure
}

export const maxCut: ProblemFormat = {
  id: ID,
  title: 'Max-cut edge list',
  extensions: ['txt', 'mc'],
  mediaType: 'text/plain',
  sniff,
  read,
  write,
}
