import type { Control } from '../../../shared/engine/control'
import type { WorkingParts, WrittenFormat } from '../../../shared/engine/machine/graph-files/write-graph-file'
import { writeGraphFile } from '../../../shared/engine/machine/graph-files/write-graph-file'

export interface WriteGraphInput {
  parts: WorkingParts
  format: WrittenFormat
}

/** The UTF-8 text of a machine graph as a file. */
export function writeMachineGraph({ parts, format }: WriteGraphInput, _control: Control<never>) {
  return { bytes: new TextEncoder().encode(writeGraphFile(parts, format)) }
}
