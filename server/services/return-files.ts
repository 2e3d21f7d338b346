import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { readyRow } from './loaded-return'
import { programmeBench, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'
import { unpackSamples } from './samples-data'

/** Cells of a samples file: three characters each, below the longest text there can be. */
const MAX_CELLS = 150_000_000

/** The raw samples as CSV: a header of qubit numbers, one line a row, with counts. */
export async function samplesFile(
  app: App,
  actor: Actor,
  id: string,
): Promise<{ fileName: string; bytes: Uint8Array }> {
  const row = await readyRow(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const bench = await benchOf(app, actor, row)
  const { qubits } = requireProgrammed(programmeBench(bench, row.settings))
  const samples = unpackSamples(await app.blobs.read(row.samplesBlobId!))
  const { rows, width } = samples
  if (rows * (width + 1) > MAX_CELLS)
    throw new DomainError(
      'too large',
      'samples.size',
      `${rows} rows of ${width} qubits are too much for one CSV file. Rehearse with fewer reads to take the samples out.`,
    )
  const qubitIds = Array.from(qubits, (q) => bench.machine.fabric.ids[q]!)
  const { bytes } = await app.compute.run('writeSamplesFile', { samples, qubitIds })
  return { fileName: `RS-${sheet.number}-${row.source}-${row.number}.csv`, bytes }
}
