import type { Random } from '../../random'
import { graphFromSortedEdges } from '../build'
import type { Graph } from '../graph'
import { connectedGraphs } from './parts'
import type { Part } from './parts'
import { rankEqualise } from './sites'
import type { Layout, Sites } from './sites'
import { placementStart } from './start'

/** A rectangle of the plane. */
interface Box {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
}

/** Several parts, their vertices numbered on from part to part, on one grid of sites. */
export interface Packed extends Part {
  readonly sites: Sites
}

/**
 * Divides a box among items by area, in their order: halved by weight again and again across its longer side.
 * Calls `take` with each item's box.
 */
function divide(
  weights: readonly number[],
  from: number,
  to: number,
  box: Box,
  take: (k: number, box: Box) => void,
): void {
  if (to - from === 1) return take(from, box)
  let total = 0
  for (let k = from; k < to; k++) total += weights[k]!
  let middle = from + 1
  let first = weights[from]!
  while (middle < to - 1 && first + weights[middle]! / 2 < total / 2) first += weights[middle++]!
  const share = first / total
  const { left, top, width, height } = box
  const wide = width >= height
  const [w, h] = wide ? [width * share, height] : [width, height * share]
  divide(weights, from, middle, { left, top, width: w, height: h }, take)
  const rest = wide
    ? { left: left + w, top, width: width - w, height }
    : { left, top: top + h, width, height: height - h }
  divide(weights, middle, to, rest, take)
}

/** The parts side by side as one graph. */
function joined(parts: readonly Part[]): Part {
  const order = parts.reduce((sum, { vertices }) => sum + vertices.length, 0)
  const ends = new Uint32Array(parts.reduce((sum, { graph }) => sum + graph.ends.length, 0))
  const vertices = new Int32Array(order)
  let [at, slot] = [0, 0]
  for (const part of parts) {
    for (let k = 0; k < part.graph.ends.length; k++) ends[slot++] = part.graph.ends[k]! + at
    vertices.set(part.vertices, at)
    at += part.vertices.length
  }
  return { graph: graphFromSortedEdges(order, ends), vertices }
}

/** Copies sites into the box as points of the plane. */
function fillBox({ columns, rows, column, row }: Sites, box: Box, { x, y }: Layout, at: number): void {
  for (let v = 0; v < column.length; v++) {
    x[at + v] = box.left + ((column[v]! + 0.5) / columns) * box.width
    y[at + v] = box.top + ((row[v]! + 0.5) / rows) * box.height
  }
}

/**
 * Lays the connected parts of what `kept` marks out, each for itself, and packs them by size into one grid.
 * @throws RangeError when there are more vertices than sites
 */
export function packParts(graph: Graph, kept: Uint8Array, columns: number, rows: number, random: Random): Packed {
  const parts = connectedGraphs(graph, kept)
  const whole = joined(parts)
  const order = whole.vertices.length
  if (order > columns * rows) throw new RangeError(`${order} vertices do not fit ${columns} × ${rows} sites`)
  if (parts.length === 1) return { ...whole, sites: placementStart(whole.graph, columns, rows, random).sites }
  const drawing = { x: new Float64Array(order), y: new Float64Array(order) }
  const weights = parts.map(({ vertices }) => vertices.length)
  let at = 0
  const layOut = (k: number, box: Box): void => {
    const part = parts[k]!.graph
    const partColumns = Math.max(1, Math.round(Math.sqrt((part.order * box.width) / box.height)))
    const partRows = Math.ceil(part.order / partColumns)
    fillBox(placementStart(part, partColumns, partRows, random).sites, box, drawing, at)
    at += part.order
  }
  if (parts.length > 0) divide(weights, 0, parts.length, { left: 0, top: 0, width: columns, height: rows }, layOut)
  return { ...whole, sites: rankEqualise(drawing.x, drawing.y, columns, rows) }
}
