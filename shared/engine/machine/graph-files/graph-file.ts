import type { Control } from '../../control'
import type { ReadingIssue, ReadingProgress } from '../../formats/format'
import { groupDigits } from '../../digits'

export const GRAPH_FORMATS = ['edge-list', 'matrix-market', 'graphml', 'json'] as const
export type GraphFormat = (typeof GRAPH_FORMATS)[number]

/** The largest published number that a qubit of an uploaded graph may have. */
export const LARGEST_NUMBER = 10_000_000

/** A graph as a file holds it. */
export interface ReadGraph {
  /** Qubit numbers, ascending. */
  readonly ids: Uint32Array
  /** Couplers by place in `ids`: each once, lower place first, sorted. */
  readonly ends: Uint32Array
  /** (x, y) of each qubit in the file's own units, y downwards; null where the file has none. */
  readonly positions: Float64Array | null
}

export interface GraphReading {
  readonly format: GraphFormat
  readonly formatSource: 'given' | 'detected'
  /** Null exactly when there are issues. */
  readonly graph: ReadGraph | null
  /** The first 100 things that are wrong, with their line where the format has lines. */
  readonly issues: readonly ReadingIssue[]
  readonly issueCount: number
}

export type GraphControl = Control<ReadingProgress>

/** A value as it stands in the file, cut to a readable length. */
export function shown(value: unknown): string {
  const text = typeof value === 'string' ? `"${value}"` : (JSON.stringify(value) ?? 'nothing')
  return text.length > 42 ? `${text.slice(0, 40)}…` : text
}

/** The number of a qubit from a text or a number; a text says why it is none. */
export function qubitNumber(value: unknown): number | string {
  const isWhole = typeof value === 'number' ? Number.isInteger(value) && value >= 0 : /^\d{1,15}$/.test(String(value))
  if ((typeof value !== 'number' && typeof value !== 'string') || !isWhole)
    return `${shown(value)} is no qubit number: qubits have whole numbers from 0, so number them and write the numbers`
  const number = Number(value)
  return number <= LARGEST_NUMBER ? number : `qubit ${number}: numbers end at ${groupDigits(LARGEST_NUMBER)}`
}
