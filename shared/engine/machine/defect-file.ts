import type { Defects } from './fabric'
import { formatDefectText, parseDefectText } from './defect-text'

/** What is wrong with a file, by line (from 1) or by place. */
export interface DefectFileIssue {
  readonly line?: number
  readonly path?: string
  readonly message: string
}

export interface ReadDefectFile {
  /** The file as a typed list, line for line where it was text; null where it cannot be read. */
  readonly text: string | null
  readonly issues: readonly DefectFileIssue[]
  /**
   * `couplers`: every line held two numbers, and they were taken as the two ends of a coupler.
   * `list`: a list as it is typed. `json`: `{qubits, couplers}`.
   */
  readonly kind: 'list' | 'couplers' | 'json'
}

const LARGEST_NUMBER = 0xffffffff
const MOST_ISSUES = 100
const PAIR = /^\s*"?(\d+)"?\s*[\s,;]\s*"?(\d+)"?\s*$/

const isQubit = (value: unknown): value is number =>
  Number.isInteger(value) && (value as number) >= 0 && (value as number) <= LARGEST_NUMBER

/** Line of a place in a text, from 1. */
const lineAt = (text: string, position: number): number => text.slice(0, position).split('\n').length

/** Runtimes tell the place by position or by line, or only quote it. */
function syntaxIssue(text: string, error: unknown): DefectFileIssue {
  const told = /position (\d+)|line (\d+)/.exec(String(error))
  const line = told?.[1] ? lineAt(text, Number(told[1])) : told?.[2] ? Number(told[2]) : undefined
  return { line, message: `the file is not valid JSON: ${error instanceof Error ? error.message : 'unreadable'}` }
}

function listOf(value: unknown, path: string, issues: DefectFileIssue[]): unknown[] {
  if (value === undefined) return []
  if (Array.isArray(value)) return value
  issues.push({ path, message: 'must be a list' })
  return []
}

function readJson(text: string): ReadDefectFile {
  let value: unknown
  try {
    value = JSON.parse(text)
  } catch (error) {
    return { text: null, issues: [syntaxIssue(text, error)], kind: 'json' }
  }
  const issues: DefectFileIssue[] = []
  const given = value as { qubits?: unknown; couplers?: unknown }
  if (Array.isArray(value) || (given.qubits === undefined && given.couplers === undefined))
    return {
      text: null,
      issues: [{ message: 'the file must hold {"qubits": […], "couplers": [[a, b], …]}' }],
      kind: 'json',
    }
  const qubits = listOf(given.qubits, 'qubits', issues)
  const couplers = listOf(given.couplers, 'couplers', issues)
  qubits.forEach((id, k) => {
    if (!isQubit(id)) issues.push({ path: `qubits[${k}]`, message: 'is not a qubit number' })
  })
  couplers.forEach((pair, k) => {
    const problem = pairProblem(pair)
    if (problem) issues.push({ path: `couplers[${k}]`, message: problem })
  })
  if (issues.length > 0) return { text: null, issues: issues.slice(0, MOST_ISSUES), kind: 'json' }
  return { text: formatDefectText({ qubits, couplers } as Defects), issues, kind: 'json' }
}

function pairProblem(pair: unknown): string | null {
  if (!Array.isArray(pair) || pair.length !== 2 || !pair.every(isQubit)) return 'is not a pair of qubit numbers'
  return pair[0] === pair[1] ? 'a coupler joins two different qubits' : null
}

/**
 * Reads a file of missing parts: JSON `{"qubits": [3], "couplers": [[4, 9]]}`, a list as it is typed (`3, 4-9`), or two
 * columns of numbers with or without a header, which are couplers; `#` opens a comment. Lines stay lines, so that what
 * is wrong is found again. Whether the numbers exist is for `defectIssues` to say.
 *
 * @param columns what two numbers on every line are: the ends of a coupler, unless told that they are qubits
 */
export function readDefectFile(contents: string, columns: 'couplers' | 'qubits' = 'couplers'): ReadDefectFile {
  const text = contents.replace(/^\ufeff/, '')
  if (/^\s*[{[]/.test(text)) return readJson(text)
  const lines = text.split(/\r\n|\r|\n/)
  const first = lines.findIndex((line) => line.replace(/#.*$/, '').trim() !== '')
  // A header has no digit in it: `a,b`.
  if (first >= 0 && !/\d/.test(lines[first]!)) lines[first] = `# ${lines[first]}`
  const rows = lines.map((line) => line.replace(/#.*$/, '')).filter((line) => line.trim() !== '')
  const isPairs = columns === 'couplers' && rows.length > 0 && rows.every((row) => PAIR.test(row))
  const list = isPairs ? lines.map((line) => line.replace(/^[^#]*/, (row) => row.replace(PAIR, '$1-$2'))) : lines
  const written = list.join('\n').replace(/\n+$/, '')
  const issues = parseDefectText(written)
    .rejected.slice(0, MOST_ISSUES)
    .map((entry) => ({ line: entry.line, message: `“${entry.text.slice(0, 40)}”: ${entry.reason}` }))
  return { text: written, issues, kind: isPairs ? 'couplers' : 'list' }
}
