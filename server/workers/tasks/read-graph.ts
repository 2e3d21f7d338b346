import { graphFromSortedEdges } from '../../../shared/engine/graph/build'
import type { GraphFigures } from '../../../shared/engine/machine/graph-files/figures'
import { graphFigures } from '../../../shared/engine/machine/graph-files/figures'
import type { GraphControl, GraphFormat, GraphReading } from '../../../shared/engine/machine/graph-files/graph-file'
import { drawnSegments, segmentsAt } from '../../../shared/engine/machine/graph-files/places'
import { readGraphFile } from '../../../shared/engine/machine/graph-files/read-graph-file'

/** A graph file as it was read, and drawn where it says nothing about places. */
export interface ReadGraphOutput {
  reading: Omit<GraphReading, 'graph'>
  /** Null where the file was refused. */
  machine: {
    ids: Uint32Array
    ends: Uint32Array
    segments: Float32Array
    positions: 'given' | 'drawn'
    figures: GraphFigures
  } | null
}

/** Reads an uploaded machine graph, and lays it out if it has no positions. */
export function readMachineGraph(
  { bytes, format }: { bytes: Uint8Array; format?: GraphFormat },
  control: GraphControl,
): ReadGraphOutput {
  const { graph, ...reading } = readGraphFile(bytes, { format, control })
  if (!graph) return { reading, machine: null }
  const { ids, ends, positions } = graph
  const segments = positions ? segmentsAt(positions) : drawnSegments(graph)
  if (typeof segments === 'string')
    return { reading: { ...reading, issues: [{ message: segments }], issueCount: 1 }, machine: null }
  const figures = graphFigures(graphFromSortedEdges(ids.length, ends), ids)
  return { reading, machine: { ids, ends, segments, positions: positions ? 'given' : 'drawn', figures } }
}
