import { closeSync, openSync, readSync } from 'node:fs'
import type { Control } from '../../../shared/engine/control'
import type { ReadingProgress } from '../../../shared/engine/formats/format'
import { drawGauge, undoGauges } from '../../../shared/engine/programming/gauges'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { EnergyAgreement } from '../../../shared/engine/readout/energy-agreement'
import { energyAgreement } from '../../../shared/engine/readout/energy-agreement'
import type { SamplesFormat, SamplesReading } from '../../../shared/engine/readout/files'
import { readSamples } from '../../../shared/engine/readout/files'
import type { SampleRows } from '../../../shared/engine/sampling/samples'

const CHUNK_BYTES = 2 ** 20

export interface ReadSamplesInput {
  path: string
  format?: SamplesFormat
  /** Published numbers of the run sheet's qubits, in the order of its programmed values. */
  qubitIds: number[]
  /** Numbers of the file's columns, where it does not say them itself. */
  order: number[] | null
  programmed: Programmed
  gauges: { count: number; seed: number; areUndone: boolean }
}

export interface ReadSamplesOutput {
  /** The rows with their gauges undone; null with the reasons in `issues`. */
  reading: SamplesReading
  /** Null where the file holds no energies. */
  agreement: EnergyAgreement | null
}

/** The bytes of a file in pieces, each in memory of its own. */
function* fileChunks(path: string): Generator<Uint8Array> {
  const file = openSync(path, 'r')
  try {
    for (;;) {
      const chunk = new Uint8Array(CHUNK_BYTES)
      const length = readSync(file, chunk)
      if (length === 0) return
      yield chunk.subarray(0, length)
    }
  } finally {
    closeSync(file)
  }
}

const refused = (reading: SamplesReading, message: string): ReadSamplesOutput => ({
  reading: { ...reading, rows: null, issues: [{ message }] },
  agreement: null,
})

/** Why the gauges of the rows cannot be those of the run sheet, or null. */
function gaugeFault({ gauges }: SampleRows, { count, areUndone }: ReadSamplesInput['gauges']): string | null {
  if (!gauges)
    return !areUndone && count > 1
      ? 'the rows do not say their gauge, so it cannot be undone: add a column "gauge" with the numbers of the bundle'
      : null
  const beyond = gauges.find((number) => number >= count)
  return beyond === undefined ? null : `gauge ${beyond} is named, but the run sheet has gauges 0 to ${count - 1}`
}

/** Reads returned samples, undoes their gauges where that is still to do, and holds their energies against the programme. */
export function readSamplesFile(input: ReadSamplesInput, control: Control<ReadingProgress>): ReadSamplesOutput {
  const { path, format, qubitIds, order, programmed, gauges } = input
  const reading = readSamples(fileChunks(path), { format, qubitIds, order, control })
  if (!reading.rows) return { reading, agreement: null }
  const fault = gaugeFault(reading.rows, gauges)
  if (fault) return refused(reading, fault)
  const signsOf = (number: number): Int8Array => drawGauge(programmed, gauges.seed, number, 'chain')
  const isTurned = gauges.count > 1 && reading.rows.gauges !== null
  const rows = isTurned && !gauges.areUndone ? undoGauges(reading.rows, signsOf) : reading.rows
  const turn = isTurned ? { signsOf, isDone: !gauges.areUndone } : null
  return { reading: { ...reading, rows }, agreement: rows.energies && energyAgreement(rows, programmed, turn) }
}
