/** Where the qubits of an uploaded graph are drawn: at the file's positions, or at a drawing worked out once. */
import { graphFromSortedEdges } from '../../graph/build'
import { layoutOfMachine } from '../../graph/layout/machine'
import { rankEqualise } from '../../graph/layout/sites'
import type { ReadGraph } from './graph-file'

export const PLACES_DEFAULTS = {
  /** Qubits whose nearest neighbour is looked for, to tell how far apart qubits lie. */
  sampled: 512,
  /** Square line spacings that a drawing may take up: the pages keep tables of its cells. */
  mostArea: 2 ** 24,
  /** Sites for each qubit of a drawing that was worked out. */
  room: 2,
  /** From this share of qubits with a site of their own the drawing is kept, and only the others are moved. */
  apart: 0.8,
} as const

/** The distance to the nearest other qubit, the median of qubits spread evenly over the list; 1 for a single one. */
export function medianSpacing(positions: Float64Array): number {
  const order = positions.length / 2
  if (order < 2) return 1
  const step = Math.max(1, Math.floor(order / PLACES_DEFAULTS.sampled))
  const nearest: number[] = []
  for (let q = 0; q < order; q += step) {
    let least = Infinity
    for (let other = 0; other < order; other++) {
      if (other === q) continue
      const [dx, dy] = [positions[2 * other]! - positions[2 * q]!, positions[2 * other + 1]! - positions[2 * q + 1]!]
      least = Math.min(least, dx * dx + dy * dy)
    }
    nearest.push(Math.sqrt(least))
  }
  return nearest.sort((a, b) => a - b)[nearest.length >> 1]!
}

/** Both ends of each qubit at one point. */
function pointsAt(order: number, at: (q: number) => readonly [number, number]): Float32Array {
  const segments = new Float32Array(4 * order)
  for (let q = 0; q < order; q++) {
    const [x, y] = at(q)
    segments.set([x, y, x, y], 4 * q)
  }
  return segments
}

/**
 * Given positions in line spacings: the corner of their rectangle at 0, the median distance to the nearest other qubit 1,
 * or less where the rectangle would become too large to be drawn.
 * @returns a sentence where the drawing could not tell two qubits apart
 */
export function segmentsAt(positions: Float64Array): Float32Array | string {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity]
  for (let k = 0; k < positions.length; k += 2) {
    left = Math.min(left, positions[k]!)
    right = Math.max(right, positions[k]!)
    top = Math.min(top, positions[k + 1]!)
    bottom = Math.max(bottom, positions[k + 1]!)
  }
  const scale = Math.min(1 / medianSpacing(positions), mostScale(right - left, bottom - top))
  const segments = pointsAt(positions.length / 2, (q) => [
    (positions[2 * q]! - left) * scale,
    (positions[2 * q + 1]! - top) * scale,
  ])
  return areApart(segments)
    ? segments
    : 'some positions are too near each other, beside how far the others reach, to be drawn apart'
}

/** The largest s with (s·width + 1)(s·height + 1) at most `mostArea`: the root of a quadratic, in its stable form. */
function mostScale(width: number, height: number): number {
  const room = PLACES_DEFAULTS.mostArea - 1
  const sides = width + height
  return (2 * room) / (sides + Math.sqrt(sides * sides + 4 * width * height * room))
}

/** Whether all points are finite and no two alike, to 1/1024 of a line spacing. */
function areApart(segments: Float32Array): boolean {
  if (!segments.every(Number.isFinite)) return false
  const fine = (value: number): number => Math.round(1024 * value)
  const seen = new Set<string>()
  for (let k = 0; k < segments.length; k += 4) seen.add(`${fine(segments[k]!)},${fine(segments[k + 1]!)}`)
  return seen.size === segments.length / 4
}

/** A square of sites, at most one qubit each. */
class Sites {
  private readonly taken: Uint8Array

  constructor(readonly side: number) {
    this.taken = new Uint8Array(side * side)
  }

  /** Takes the site, unless another qubit has. */
  take(column: number, row: number): boolean {
    if (column < 0 || row < 0 || column >= this.side || row >= this.side || this.taken[row * this.side + column])
      return false
    this.taken[row * this.side + column] = 1
    return true
  }

  /** Takes a free site near the one given: ring by ring around it. */
  takeNear(column: number, row: number): readonly [number, number] {
    for (let reach = 1; ; reach++)
      for (let along = -reach; along <= reach; along++)
        for (const [dx, dy] of [
          [along, -reach],
          [along, reach],
          [-reach, along],
          [reach, along],
        ] as const)
          if (this.take(column + dx, row + dy)) return [column + dx, row + dy]
  }
}

/** Stretched to fill the square of sites. */
function stretched(segments: Float32Array, side: number): { x: Float64Array; y: Float64Array } {
  const order = segments.length / 4
  const axis = (first: number): Float64Array => {
    const values = Float64Array.from({ length: order }, (_, q) => segments[4 * q + first]!)
    const least = values.reduce((a, b) => Math.min(a, b), Infinity)
    const most = values.reduce((a, b) => Math.max(a, b), -Infinity)
    return most > least ? values.map((v) => ((v - least) / (most - least)) * (side - 1)) : values.fill((side - 1) / 2)
  }
  return { x: axis(0), y: axis(1) }
}

/**
 * A drawing of a graph without positions. The layout of a machine without geometry is stretched over twice as many sites
 * as there are qubits. Where most qubits have a site to themselves, as in meshes, they keep their place and the others
 * move to the nearest free site; otherwise the qubits are spread evenly, in the layout's order. No two share a place.
 */
export function drawnSegments({ ids, ends }: Pick<ReadGraph, 'ids' | 'ends'>): Float32Array {
  const order = ids.length
  const graph = graphFromSortedEdges(order, ends)
  const layout = layoutOfMachine(graph, new Uint8Array(order).fill(1))
  const side = Math.max(1, Math.ceil(Math.sqrt(PLACES_DEFAULTS.room * order)))
  const { x, y } = stretched(layout, side)
  const sites = new Sites(side)
  const first = Array.from({ length: order }, (_, q) => sites.take(Math.round(x[q]!), Math.round(y[q]!)))
  if (first.filter(Boolean).length >= PLACES_DEFAULTS.apart * order)
    return pointsAt(order, (q) => (first[q] ? [x[q]!, y[q]!] : sites.takeNear(Math.round(x[q]!), Math.round(y[q]!))))
  const columns = Math.ceil(Math.sqrt(order))
  const { column, row } = rankEqualise(x, y, columns, columns)
  return pointsAt(order, (q) => [column[q]!, row[q]!])
}
