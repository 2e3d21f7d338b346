import { isZip } from '../../formats/archive'
import { chunksOf, peek, watched } from '../../formats/chunks'
import { openContainer } from '../../formats/container'
import { ReadingFault } from '../../formats/format'
import { isNpy } from '../../formats/npy-header'
import { readCsv } from './csv'
import { readJson } from './json'
import { readNpy } from './npy'
import { readNpz } from './npz'
import type { Columns, ReadSamplesOptions, RowsRead, SamplesFormat, SamplesReading } from './reading'

export type { SamplesFormat, SamplesReading } from './reading'

const DEFAULTS = { headBytes: 4096 }
const OPENING_BRACE = 0x7b
const BLANKS = [0x20, 0x09, 0x0a, 0x0d]

const READERS: Record<SamplesFormat, (chunks: Iterable<Uint8Array>, columns: Columns) => RowsRead> = {
  csv: readCsv,
  npy: readNpy,
  npz: readNpz,
  json: readJson,
}

/** The format that the beginning of a file belongs to; CSV when it is none of the others. */
export function detectSamplesFormat(head: Uint8Array): SamplesFormat {
  if (isNpy(head)) return 'npy'
  if (isZip(head)) return 'npz'
  return head.find((code) => !BLANKS.includes(code)) === OPENING_BRACE ? 'json' : 'csv'
}

const NOTHING: RowsRead = {
  rows: null,
  issues: [],
  rejectedCount: 0,
  valueSet: '±1',
  columnsFrom: 'file',
  hasCounts: false,
  machineTimeSeconds: null,
}

/**
 * Reads returned samples from the bytes of a file, whole or in chunks, in the format given or else the one detected; gzip
 * is undone first. Spins come out bit-packed, in the order of the asked qubits. Memory: the packed rows and a few MiB for
 * CSV and `.npy`; the packed file besides for `.npz`; the whole document for JSON.
 * @returns with `rows` null and the reasons in `issues` for whatever the bytes hold that cannot be accepted; never throws
 */
export function readSamples(source: Uint8Array | Iterable<Uint8Array>, options: ReadSamplesOptions): SamplesReading {
  const { control, format: given, ...columns } = options
  let format: SamplesFormat = given ?? 'csv'
  let container: SamplesReading['container'] = null
  try {
    const opened = openContainer(watched(source instanceof Uint8Array ? chunksOf(source) : source, control))
    container = opened.container
    const { head, chunks } = peek(opened.chunks, DEFAULTS.headBytes)
    format = given ?? detectSamplesFormat(head)
    return { ...READERS[format](chunks, columns), format, container, isReadToEnd: true }
  } catch (error) {
    if (!(error instanceof ReadingFault)) throw error
    const issue = { ...(error.line === undefined ? {} : { line: error.line }), message: error.message }
    return { ...NOTHING, format, container, issues: [issue], isReadToEnd: false }
  }
}
