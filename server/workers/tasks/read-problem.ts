import type { Control } from '../../../shared/engine/control'
import { readProblem } from '../../../shared/engine/formats'
import type { FileReading, ReadingProgress, ReadOptions } from '../../../shared/engine/formats/format'
import type { StructureReport } from '../../../shared/engine/problem/structure'
import { structureOf } from '../../../shared/engine/problem/structure'

export interface ReadProblemInput extends ReadOptions {
  bytes: Uint8Array
  format?: string
}

export interface ReadProblemOutput {
  reading: FileReading
  structure: StructureReport | null
}

/** Reads an uploaded problem file and reports its structure. */
export function readProblemFile(
  { bytes, ...options }: ReadProblemInput,
  control: Control<ReadingProgress>,
): ReadProblemOutput {
  const reading = readProblem(bytes, { ...options, control })
  return { reading, structure: reading.problem ? structureOf(reading.problem) : null }
}

/** The rejected lines of an uploaded file alone, as CSV. */
export function listRejectedLines({ bytes, ...options }: ReadProblemInput, control: Control<ReadingProgress>) {
  return { list: readProblem(bytes, { ...options, control }).rejectedList }
}
