import type { z } from 'zod'
import type { Graph } from '../../shared/engine/graph/graph'
import { sizeOf } from '../../shared/engine/graph/graph'
import { couplerPlace } from '../../shared/engine/machine/layout'
import { packArrays } from '../../shared/packed-arrays'
import type { graphQuerySchema } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import { calibratedMachine } from './machine-graphs'

const MEDIA_TYPES = { json: 'application/json', csv: 'text/csv', mtx: 'text/plain' } as const

/** The working graph at a calibration as a file, by published number; written in a thread, as it may be large. */
export async function machineGraphFile(
  app: App,
  actor: Actor,
  id: string,
  { calibration, format }: z.infer<typeof graphQuerySchema>,
) {
  const { graph, usable, fabric, machine } = await calibratedMachine(app, actor, id, calibration)
  const { ids, segments } = fabric
  const parts = { ids, segments, usable, ends: graph.ends }
  const { bytes } = await app.compute.run('writeMachineGraph', { parts, format })
  return { fileName: `${machine.name}.${format}`, mediaType: MEDIA_TYPES[format], bytes }
}

/** What the lattice view draws, as packed arrays: numbers, segments, working qubits, couplers and where they attach, missing couplers between working qubits, couplers of missing qubits. */
export async function latticeOf(app: App, actor: Actor, id: string, calibration?: number): Promise<Uint8Array> {
  const { graph, usable, fabric, sheet, indexOf } = await calibratedMachine(app, actor, id, calibration)
  // Couplers of a missing qubit go without saying.
  const between = sheet.defects.couplers.filter((pair) => pair.every((id) => usable[indexOf(id)]))
  const missingCouplers = Uint32Array.from(between.flat(), indexOf)
  const couplersOfMissing = idleCouplers(fabric.graph, usable)
  const places = new Float32Array(4 * sizeOf(graph))
  const drawing = { graph, segments: fabric.segments }
  for (let k = 0; k < sizeOf(graph); k++) couplerPlace(drawing, k, places.subarray(4 * k, 4 * k + 4))
  const { ids, segments } = fabric
  return packArrays({ ids, segments, usable, ends: graph.ends, places, missingCouplers, couplersOfMissing })
}

/** The couplers, as pairs of dense indices, that cannot be used because one of their qubits is missing. */
function idleCouplers({ ends }: Graph, usable: Uint8Array): Uint32Array {
  const idle: number[] = []
  for (let at = 0; at < ends.length; at += 2)
    if (!usable[ends[at]!] || !usable[ends[at + 1]!]) idle.push(ends[at]!, ends[at + 1]!)
  return Uint32Array.from(idle)
}
