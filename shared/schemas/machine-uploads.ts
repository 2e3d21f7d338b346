import { z } from 'zod'
import type { GraphFigures } from '../engine/machine/graph-files/figures'
import { GRAPH_FORMATS } from '../engine/machine/graph-files/graph-file'
import type { GraphFormat } from '../engine/machine/graph-files/graph-file'
import { flag } from './common'
import { createMachineSchema } from './machines'

/** Text of the form's part `machine`: the JSON of a new machine without its family. */
const machinePart = z
  .string()
  .transform((text, context): unknown => {
    try {
      return JSON.parse(text)
    } catch {
      context.addIssue({ code: 'custom', message: 'is not valid JSON' })
      return z.NEVER
    }
  })
  .pipe(createMachineSchema.omit({ family: true }))

/** The fields beside the part `file`. */
export const machineUploadSchema = z.object({
  format: z.enum(GRAPH_FORMATS).optional(),
  /** Read and report without saving. */
  dryRun: flag.default(false),
  machine: machinePart.optional(),
})
export type MachineUpload = z.infer<typeof machineUploadSchema>

/** What was read of a graph file. */
export interface UploadedGraph extends GraphFigures {
  /** Short name, such as `graph of 812 qubits`. */
  graph: string
  format: GraphFormat
  formatSource: 'given' | 'detected'
  /** Whether the file says where the qubits lie; a drawing is worked out otherwise. */
  positions: 'given' | 'drawn'
  /** Equal for equal numbers, couplers and places. */
  fingerprint: string
}

/** Answer to an upload that was saved; `qubits` and `couplers` are those that work. */
export interface UploadedMachine extends UploadedGraph {
  id: string
  calibration: number
}
