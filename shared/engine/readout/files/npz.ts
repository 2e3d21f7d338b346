import { readZip, streamZipEntry } from '../../formats/archive'
import type { ArchiveLimits } from '../../formats/archive-limits'
import { collected } from '../../formats/chunks'
import { ReadingFault } from '../../formats/format'
import { readNpyArray } from '../../formats/npy-array'
import type { NpyArray } from '../../formats/npy-array'
import { columnFaults } from './columns'
import { readSpins } from './npy'
import type { Columns, RowsRead, SamplesIssue } from './reading'
import { SAMPLES_LIMITS } from './reading'
import type { RowSink } from './row-sink'

const SUFFIX = '.npy'
const SPINS = 'samples'
const BESIDE = ['qubits', 'counts', 'energies', 'gauges', 'machine_time_seconds'] as const
type Beside = (typeof BESIDE)[number]

/** Spins of eight bytes, as NumPy makes them unless told otherwise, of the largest sets. */
const LIMITS: ArchiveLimits = { maxBytes: 2 ** 31, maxRatio: 1000, freeBytes: 512 * 2 ** 20 }
const LARGEST_NUMBER = 2 ** 32

function besideOf(bytes: Uint8Array): Map<Beside, NpyArray> {
  const wanted = new Set(BESIDE.map((name) => name + SUFFIX))
  const arrays = new Map<Beside, NpyArray>()
  for (const [entry, contents] of readZip(bytes, (name) => wanted.has(name as `${Beside}.npy`))) {
    const name = entry.slice(0, -SUFFIX.length) as Beside
    arrays.set(name, readNpyArray(name, contents))
  }
  return arrays
}

/** Columns as the archive's own numbers say, where it has them. */
function columnsOf(qubits: NpyArray | undefined, columns: Columns): Columns {
  if (!qubits) return columns
  const order = Array.from(qubits.indices(LARGEST_NUMBER))
  const faults = columnFaults(order, columns)
  if (faults.length > 0) throw new ReadingFault(`the archive has ${faults.join('; ')}`)
  return { ...columns, order }
}

/** One value a row, put where the rows are. */
function fill<T extends Uint32Array | Float64Array>(into: T, from: T, name: Beside, rows: number): void {
  if (from.length !== rows) throw new ReadingFault(`${name} in the archive has ${from.length} values for ${rows} rows`)
  into.set(from)
}

function fillBeside(arrays: ReadonlyMap<Beside, NpyArray>, sink: RowSink): SamplesIssue[] {
  const { rows } = sink
  const counts = arrays.get('counts')?.indices(SAMPLES_LIMITS.greatestCount + 1)
  if (counts) fill(sink.counts, counts, 'counts', rows)
  const gauges = arrays.get('gauges')?.indices(SAMPLES_LIMITS.greatestCount + 1)
  if (gauges) fill(sink.gauges, gauges, 'gauges', rows)
  const energies = arrays.get('energies')?.coefficients()
  if (energies) fill(sink.energies, energies, 'energies', rows)
  const none = counts?.indexOf(0) ?? -1
  return none < 0 ? [] : [{ message: `counts[${none}] in the archive is 0: whole numbers from 1 are needed` }]
}

/** @throws ReadingFault unless it is one number above zero */
function secondsOf(array: NpyArray | undefined): number | null {
  if (!array) return null
  const [seconds, ...others] = array.coefficients()
  if (seconds === undefined || others.length > 0 || !(seconds > 0))
    throw new ReadingFault('machine_time_seconds in the archive is not one number above zero')
  return seconds
}

/**
 * Reads an archive of NumPy arrays (`numpy.savez`, compressed or not): `samples`, a row per read and a column per qubit;
 * and what is there of `qubits` (the number of each column), `counts`, `energies` and `gauges` (a value per row, gauges
 * from 0) and `machine_time_seconds` (one number). Other arrays are left alone.
 * @throws ReadingFault when the bytes are no such archive
 */
export function readNpz(chunks: Iterable<Uint8Array>, columns: Columns): RowsRead {
  const bytes = collected(chunks)
  const beside = besideOf(bytes)
  const spins = streamZipEntry(bytes, SPINS + SUFFIX, LIMITS)
  if (!spins) throw new ReadingFault(`the archive has no array "${SPINS}"`)
  const own = columnsOf(beside.get('qubits'), columns)
  const { sink, columns: ordered } = readSpins(spins, own)
  const issues = fillBeside(beside, sink)
  sink.issues.push(...issues)
  return {
    rows: sink.finish({ energies: beside.has('energies'), gauges: beside.has('gauges') }),
    issues: sink.issues,
    rejectedCount: 0,
    valueSet: sink.valueSet,
    columnsFrom: beside.has('qubits') ? 'file' : ordered.from,
    hasCounts: beside.has('counts'),
    machineTimeSeconds: secondsOf(beside.get('machine_time_seconds')),
  }
}
