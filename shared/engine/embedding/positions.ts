import { pivotLayout } from '../graph/layout/pivot'
import { createRandom } from '../random'
import type { EmbeddingTask } from './task'

/** Where the qubits lie: as given, else a drawing of the machine graph that brings coupled qubits near each other. */
export function positionsOf({ segments, machine }: EmbeddingTask): Float32Array {
  if (segments) return segments
  const { x, y } = pivotLayout(machine, createRandom(machine.order))
  const points = new Float32Array(4 * machine.order)
  for (let q = 0; q < machine.order; q++) {
    points[4 * q] = points[4 * q + 2] = x[q]!
    points[4 * q + 1] = points[4 * q + 3] = y[q]!
  }
  return points
}
