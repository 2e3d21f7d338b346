import type { z } from 'zod'
import type { Graph } from '../../shared/engine/graph/graph'
import { sizeOf } from '../../shared/engine/graph/graph'
import { couplerPlace } from '../../shared/engine/machine/layout'
import { packArrays } from '../../shared/packed-arrays'
import type { graphQuerySchema, MachineGraph } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import { calibratedMachine } from './machine-graphs'

/** The working graph at a calibration: qubits and couplers by published number, and a point to draw each qubit at. */
export async function machineGraph(app: App, actor: Actor, id: string, calibration?: number): Promise<MachineGraph> {
  const { graph, usable, fabric } = await calibratedMachine(app, actor, id, calibration)
  const { ids, segments } = fabric
  const working = Array.from(usable.keys()).filter((q) => usable[q])
  return {
    nodes: working.map((q) => ids[q]!),
    edges: Array.from({ length: sizeOf(graph) }, (_, k): [number, number] => [
      ids[graph.ends[2 * k]!]!,
      ids[graph.ends[2 * k + 1]!]!,
    ]),
    positions: working.map((q): [number, number] => [
      (segments[4 * q]! + segments[4 * q + 2]!) / 2,
      (segments[4 * q + 1]! + segments[4 * q + 3]!) / 2,
    ]),
  }
}

/** The working graph as a file: an edge list, or a Matrix Market symmetric pattern over numbers from 1. */
export async function machineGraphFile(
  app: App,
  actor: Actor,
  id: string,
  { calibration, format }: z.infer<typeof graphQuerySchema>,
) {
  const { graph, fabric, machine } = await calibratedMachine(app, actor, id, calibration)
  const { ids } = fabric
  const pairs = Array.from(
    { length: sizeOf(graph) },
    (_, k) => [ids[graph.ends[2 * k]!]!, ids[graph.ends[2 * k + 1]!]!] as const,
  )
  if (format === 'csv')
    return { fileName: `${machine.name}.csv`, text: `a,b\n${pairs.map(([a, b]) => `${a},${b}\n`).join('')}` }
  const side = ids[ids.length - 1]! + 1
  const head = `%%MatrixMarket matrix coordinate pattern symmetric\n% row and column = qubit number + 1\n${side} ${side} ${pairs.length}\n`
  return { fileName: `${machine.name}.mtx`, text: head + pairs.map(([a, b]) => `${b + 1} ${a + 1}\n`).join('') }
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
