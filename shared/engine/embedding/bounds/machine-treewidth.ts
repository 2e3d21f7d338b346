import type { Graph } from '../../graph/graph'
import { sizeOf } from '../../graph/graph'
import { keepEdges } from '../../graph/subgraph'
import { treewidthUpperBound } from '../../problem/treewidth'
import type { EmbeddingTask } from '../task'
import { eliminationWidth } from './elimination-width'
import { farToNear, sweepOrder } from './sweeps'
import type { SweepDirection } from './sweeps'

type MachineOfTask = Pick<EmbeddingTask, 'machine' | 'usable' | 'segments'>

/** A proved upper bound on the treewidth of a working machine. */
export interface MachineTreewidthBound {
  readonly width: number
  /** The elimination order that proves it. */
  readonly order: SweepDirection | 'far to near' | 'least fill'
}

const DEFAULTS = {
  /** Up to this many qubits elimination by least fill is tried as well, with this many words of bit rows read. */
  leastFill: { maxOrder: 512, maxWork: 2_000_000 },
}

/** Directions along the longer side first: their fronts are shorter. */
function directionsFor(segments: Float32Array): readonly SweepDirection[] {
  const reach = [0, 1].map((axis) => {
    let [least, most] = [Infinity, -Infinity]
    for (let i = axis; i < segments.length; i += 2) {
      least = Math.min(least, segments[i]!)
      most = Math.max(most, segments[i]!)
    }
    return most - least
  })
  const wide = reach[0]! >= reach[1]!
  return wide
    ? ['rightwards', 'leftwards', 'downwards', 'upwards']
    : ['downwards', 'upwards', 'rightwards', 'leftwards']
}

/** Lines passed together: two where couplers join parallel neighbours, which then are partners; otherwise one. */
function stripOf({ ends }: Graph, segments: Float32Array): number {
  const isVertical = (q: number): boolean => segments[4 * q] === segments[4 * q + 2]
  const isPoint = (q: number): boolean => isVertical(q) && segments[4 * q + 1] === segments[4 * q + 3]
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [ends[k]!, ends[k + 1]!]
    if (isPoint(a)) return 1
    const across = isVertical(a) ? 0 : 1
    if (isVertical(a) === isVertical(b) && segments[4 * a + across] !== segments[4 * b + across]) return 2
  }
  return 1
}

/** One proved bound after the other, each worked out when it is asked for; the best are likely to come first. */
export function* machineTreewidthBounds({
  machine,
  usable,
  segments,
}: MachineOfTask): Generator<MachineTreewidthBound> {
  if (segments) {
    const strip = stripOf(machine, segments)
    for (const order of directionsFor(segments))
      yield { width: eliminationWidth(machine, sweepOrder(segments, usable, order, strip)), order }
  }
  yield { width: eliminationWidth(machine, farToNear(machine, usable)), order: 'far to near' }
  if (machine.order > DEFAULTS.leastFill.maxOrder) return
  const keep = new Uint8Array(sizeOf(machine))
  for (let k = 0; k < keep.length; k++)
    keep[k] = usable[machine.ends[2 * k]!] && usable[machine.ends[2 * k + 1]!] ? 1 : 0
  const width = treewidthUpperBound(keepEdges(machine, keep), DEFAULTS.leastFill)
  if (width !== null) yield { width, order: 'least fill' }
}

/**
 * An upper bound on the treewidth of the usable part of any machine: the least width of several elimination orders,
 * each almost linear in the couplers. K_n needs treewidth n − 1, so no complete graph of more than width + 1 variables
 * can be embedded; nor can any problem whose treewidth is proved to be above `width`.
 */
export function machineTreewidthBound(machine: MachineOfTask): MachineTreewidthBound {
  let best: MachineTreewidthBound | null = null
  for (const bound of machineTreewidthBounds(machine)) if (!best || bound.width < best.width) best = bound
  return best!
}
