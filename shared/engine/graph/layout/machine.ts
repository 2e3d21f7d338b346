import { createRandom } from '../../random'
import { sizeOf } from '../graph'
import type { Graph } from '../graph'
import { connectedGraphs } from './parts'
import type { Part } from './parts'
import { pivotLayout } from './pivot'
import type { Layout } from './sites'
import { turned } from './turn'

export const MACHINE_LAYOUT_DEFAULTS = {
  /** Angles over a quarter turn among which the smallest rectangle is sought. */
  angles: 90,
  /** Space between the drawings of two parts. */
  gap: 1,
  /** Shelves are this much wider than the square that would hold all parts, since some of each stays empty. */
  shelfWidth: 1.1,
} as const

interface Extent {
  readonly least: number
  readonly most: number
}

/** A part's drawing with its rectangle's corner at the origin. */
interface Drawn {
  readonly part: Part
  readonly layout: Layout
  readonly width: number
  readonly height: number
}

/** The range of cosine·a + sine·b. */
function extentAlong(a: Float64Array, b: Float64Array, cosine: number, sine: number): Extent {
  let [least, most] = [Infinity, -Infinity]
  for (let v = 0; v < a.length; v++) {
    const value = cosine * a[v]! + sine * b[v]!
    if (value < least) least = value
    if (value > most) most = value
  }
  return { least, most }
}

/** The angle at which the turned drawing fills the smallest rectangle, so that placing over the rectangle wastes least. */
function tightestAngle({ x, y }: Layout): number {
  let [best, smallest] = [0, Infinity]
  for (let k = 0; k < MACHINE_LAYOUT_DEFAULTS.angles; k++) {
    const angle = (k * Math.PI) / 2 / MACHINE_LAYOUT_DEFAULTS.angles
    const across = extentAlong(x, y, Math.cos(angle), -Math.sin(angle))
    const down = extentAlong(x, y, Math.sin(angle), Math.cos(angle))
    const area = (across.most - across.least) * (down.most - down.least)
    if (area < smallest) [best, smallest] = [angle, area]
  }
  return best
}

/** Root mean square of the distance in the plane over the edges; 1 where there is none. */
function edgeLength(graph: Graph, { x, y }: Layout): number {
  const { ends } = graph
  let sum = 0
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [ends[k]!, ends[k + 1]!]
    sum += (x[a]! - x[b]!) ** 2 + (y[a]! - y[b]!) ** 2
  }
  return sum > 0 ? Math.sqrt(sum / sizeOf(graph)) : 1
}

function draw(part: Part): Drawn {
  const raw = pivotLayout(part.graph, createRandom(part.vertices.length))
  const { x, y } = turned(raw, tightestAngle(raw))
  const unit = edgeLength(part.graph, raw)
  const [across, down] = [extentAlong(x, y, 1, 0), extentAlong(x, y, 0, 1)]
  return {
    part,
    layout: { x: x.map((value) => (value - across.least) / unit), y: y.map((value) => (value - down.least) / unit) },
    width: (across.most - across.least) / unit,
    height: (down.most - down.least) / unit,
  }
}

/** Puts drawings on shelves one below the other, in their order; calls `place` with each one's corner. */
function shelve(drawings: readonly Drawn[], place: (drawn: Drawn, left: number, top: number) => void): void {
  const { gap, shelfWidth } = MACHINE_LAYOUT_DEFAULTS
  const area = drawings.reduce((sum, { width, height }) => sum + (width + gap) * (height + gap), 0)
  const widest = drawings.reduce((most, { width }) => Math.max(most, width), shelfWidth * Math.sqrt(area))
  let [left, top, tallest] = [0, 0, 0]
  for (const drawn of drawings) {
    if (left > 0 && left + drawn.width > widest) {
      top += tallest + gap
      left = tallest = 0
    }
    place(drawn, left, top)
    left += drawn.width + gap
    tallest = Math.max(tallest, drawn.height)
  }
}

/** Writes both ends of the segments of vertices that are not usable to the middle of the others'. */
function centreUnusable(segments: Float32Array, usable: Uint8Array, width: number, height: number): void {
  for (let q = 0; q < usable.length; q++) {
    if (usable[q] !== 0) continue
    segments.set([width / 2, height / 2, width / 2, height / 2], 4 * q)
  }
}

/**
 * Where the qubits of a machine without geometry may be thought to lie, in the form of `Fabric.segments`: points, so
 * both ends of each are equal. Each connected part is drawn by distances to pivots, which keeps couplers about equally
 * long everywhere; parts stand side by side. Unit: the root mean square of a part's couplers. Qubits that are not usable
 * lie in the middle. About a second for 100,000 qubits.
 * @param usable 1 for each qubit that counts; length machine.order
 */
export function layoutOfMachine(machine: Graph, usable: Uint8Array): Float32Array {
  const segments = new Float32Array(4 * machine.order)
  let [width, height] = [0, 0]
  shelve(connectedGraphs(machine, usable).map(draw), (drawn, left, top) => {
    const { x, y } = drawn.layout
    drawn.part.vertices.forEach((q, i) => {
      segments[4 * q] = segments[4 * q + 2] = left + x[i]!
      segments[4 * q + 1] = segments[4 * q + 3] = top + y[i]!
    })
    width = Math.max(width, left + drawn.width)
    height = Math.max(height, top + drawn.height)
  })
  centreUnusable(segments, usable, width, height)
  return segments
}
