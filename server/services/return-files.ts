import { DomainError } from '../../shared/errors'
import { packArrays } from '../../shared/packed-arrays'
import type { Actor, App } from '../app'
import { readyRow } from './loaded-return'
import { programmeBench, requireProgrammed } from './programming'
import { qubitIdsOf } from './qubit-ids'
import { benchOf, runSheetRow } from './run-sheets'
import { unpackSamples } from './samples-data'

/** Cells of a samples file: three characters each, below the longest text there can be. */
const MAX_CELLS = 150_000_000

/** Rows that the reads of a return are, with the published number of each column. */
async function rawSamples(app: App, actor: Actor, id: string) {
  const row = await readyRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const qubitIds = qubitIdsOf(bench, requireProgrammed(programmeBench(bench, row.settings)))
  return { row, qubitIds, samples: unpackSamples(await app.blobs.read(row.samplesBlobId!)) }
}

/** The same as packed arrays: `bytes` (bit-packed rows), `counts`, `qubits`; `rows` beside them. */
export async function packedSamples(app: App, actor: Actor, id: string): Promise<Uint8Array> {
  const { qubitIds, samples } = await rawSamples(app, actor, id)
  const { bytes, counts, rows } = samples
  return packArrays({ bytes, counts, qubits: Uint32Array.from(qubitIds) }, { rows })
}

/** The raw samples as CSV: a header of qubit numbers, one line a row, with counts. */
export async function samplesFile(
  app: App,
  actor: Actor,
  id: string,
): Promise<{ fileName: string; bytes: Uint8Array }> {
  const { row, qubitIds, samples } = await rawSamples(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const { rows, width } = samples
  if (rows * (width + 1) > MAX_CELLS)
    throw new DomainError(
      'too large',
      'samples.size',
      `${rows} rows of ${width} qubits are too much for one CSV file. Rehearse with fewer reads to take the samples out.`,
    )
  const { bytes } = await app.compute.run('writeSamplesFile', { samples, qubitIds })
  return { fileName: `RS-${sheet.number}-${row.source}-${row.number}.csv`, bytes }
}
