import type { Control } from '../../../shared/engine/control'
import { readProblem } from '../../../shared/engine/formats'
import type { ProblemReading, ReadOptions } from '../../../shared/engine/formats/format'
import type { StructureReport } from '../../../shared/engine/problem/structure'
import { structureOf } from '../../../shared/engine/problem/structure'

export interface ReadProblemInput extends ReadOptions {
  bytes: Uint8Array
  format?: string
}

export interface ReadProblemOutput {
  /** Null when the bytes are not text. */
  reading: ProblemReading | null
  structure: StructureReport | null
}

/** Reads an uploaded problem file and reports its structure. */
export function readProblemFile({ bytes, ...options }: ReadProblemInput, _control: Control<never>): ReadProblemOutput {
  let text: string
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return { reading: null, structure: null }
  }
  const reading = readProblem(text, options)
  return { reading, structure: reading.problem ? structureOf(reading.problem) : null }
}
