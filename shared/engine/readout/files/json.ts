/**
 * The house's own format for samples: a JSON document, described by the JSON Schema `docs/samples.schema.json`, which is
 * also served at `/api/schemas/samples.json`. `kind`, `version` and `samples` are needed, all else may be left out:
 *
 *     { "kind": "espalier.samples", "version": 1, "qubits": [4, 7, 30], "samples": [[1, -1, 1], [-1, -1, 1]],
 *       "counts": [3, 1], "energies": [-2.5, -1], "gauges": [0, 1], "machineTimeSeconds": 0.125 }
 */
import { ReadingFault } from '../../formats/format'
import { readJsonText, shownJson } from '../../formats/json-text'
import { columnFaults, orderedColumns } from './columns'
import { SAMPLES_LIMITS } from './reading'
import type { Columns, RowsRead } from './reading'
import { RowSink } from './row-sink'

export const SAMPLES_KIND = 'espalier.samples'
export const SAMPLES_VERSION = 1

const LIMITS = { bytes: 128 * 2 ** 20 }
const MEMBERS = [
  '$schema',
  'kind',
  'version',
  'qubits',
  'samples',
  'counts',
  'energies',
  'gauges',
  'machineTimeSeconds',
]

type Members = Readonly<Record<string, unknown>>

function documentOf(document: unknown): Members {
  if (typeof document !== 'object' || document === null || Array.isArray(document))
    throw new ReadingFault('the document is not a JSON object')
  const members = document as Members
  if (members.kind !== SAMPLES_KIND)
    throw new ReadingFault(`kind is ${shownJson(members.kind)}; "${SAMPLES_KIND}" is needed`)
  if (members.version !== SAMPLES_VERSION)
    throw new ReadingFault(`version is ${shownJson(members.version)}; ${SAMPLES_VERSION} is read here`)
  const unknown = Object.keys(members).filter((name) => !MEMBERS.includes(name))
  if (unknown.length > 0) throw new ReadingFault(`members that are not known: ${unknown.slice(0, 8).join(', ')}`)
  return members
}

/** A list of one value a row, or null where the document has none. @throws ReadingFault for anything else */
function listOf(
  members: Members,
  name: string,
  rows: number,
  isFit: (value: number) => boolean,
  needed: string,
): number[] | null {
  const list = members[name]
  if (list === undefined) return null
  if (!Array.isArray(list)) throw new ReadingFault(`${name} is not a list`)
  if (list.length !== rows) throw new ReadingFault(`${name} has ${list.length} values for ${rows} rows`)
  const wrong = list.findIndex((value) => typeof value !== 'number' || !isFit(value))
  if (wrong >= 0) throw new ReadingFault(`${name}[${wrong}] is ${shownJson(list[wrong])}: ${needed} is needed`)
  return list as number[]
}

const isCount = (value: number): boolean =>
  Number.isInteger(value) && value >= 1 && value <= SAMPLES_LIMITS.greatestCount
const isGauge = (value: number): boolean => value === 0 || isCount(value)

function columnsOf(members: Members, columns: Columns): Columns {
  const { qubits } = members
  if (qubits === undefined) return columns
  if (!Array.isArray(qubits) || !qubits.every((q) => Number.isSafeInteger(q) && q >= 0))
    throw new ReadingFault('qubits is not a list of qubit numbers')
  const faults = columnFaults(qubits as number[], columns)
  if (faults.length > 0) throw new ReadingFault(faults.join('; '))
  return { ...columns, order: qubits as number[] }
}

function rowOf(row: unknown, r: number, target: Int32Array, sink: RowSink): { zero: boolean; minus: boolean } {
  if (!Array.isArray(row) || row.length !== target.length)
    throw new ReadingFault(
      Array.isArray(row)
        ? `samples[${r}] has ${row.length} of ${target.length} values`
        : `samples[${r}] is ${shownJson(row)}, not a list`,
    )
  const base = sink.begin()
  let zero = false
  let minus = false
  for (let c = 0; c < target.length; c++) {
    const value: unknown = row[c]
    const place = target[c]!
    if (value === 1) sink.bytes[base + (place >> 3)]! |= 1 << (place & 7)
    else if (value === 0) zero = true
    else if (value === -1) minus = true
    else throw new ReadingFault(`samples[${r}][${c}] is ${shownJson(value)}, neither ±1 nor 0/1`)
  }
  return { zero, minus }
}

function secondsOf({ machineTimeSeconds: seconds }: Members): number | null {
  if (seconds === undefined) return null
  if (typeof seconds === 'number' && seconds > 0 && Number.isFinite(seconds)) return seconds
  throw new ReadingFault(`machineTimeSeconds is ${shownJson(seconds)}, not a number above zero`)
}

/** Reads a document of samples. @throws ReadingFault naming the first member that is wrong */
export function readJson(chunks: Iterable<Uint8Array>, columns: Columns): RowsRead {
  const members = documentOf(readJsonText(chunks, LIMITS.bytes, 'send CSV or NumPy arrays'))
  const { samples } = members
  if (!Array.isArray(samples)) throw new ReadingFault('samples is not a list of rows')
  const own = columnsOf(members, columns)
  const { target, from } = orderedColumns(own)
  const counts = listOf(members, 'counts', samples.length, isCount, 'a whole number from 1')
  const energies = listOf(members, 'energies', samples.length, Number.isFinite, 'a finite number')
  const gauges = listOf(members, 'gauges', samples.length, isGauge, 'a whole number from 0, as in the bundle,')
  const sink = new RowSink(columns.qubitIds.length)
  samples.forEach((row: unknown, r) => {
    const { zero, minus } = rowOf(row, r, target, sink)
    const extras = { count: counts?.[r] ?? 1, energy: energies?.[r] ?? 0, gauge: gauges?.[r] ?? 0 }
    sink.end(extras, zero, minus, `row ${r}`)
  })
  return {
    rows: sink.finish({ energies: energies !== null, gauges: gauges !== null }),
    issues: sink.issues,
    rejectedCount: 0,
    valueSet: sink.valueSet,
    columnsFrom: members.qubits === undefined ? from : 'file',
    hasCounts: counts !== null,
    machineTimeSeconds: secondsOf(members),
  }
}
