import { edgeBetween } from '../graph/build'
import type { Graph } from '../graph/graph'

/**
 * Qubits grouped into the straight lines they lie on. Lines 0 … verticals − 1 are vertical, from left to right; the
 * rest are horizontal, from top to bottom. Broken qubits keep their place on their line.
 */
export interface Lines {
  readonly count: number
  readonly verticals: number
  /** Where a line stands: x of a vertical line, y of a horizontal one. */
  readonly across: Float32Array
  /** The qubits of line l are qubits[offsets[l] … offsets[l + 1] − 1], top to bottom or left to right. */
  readonly offsets: Uint32Array
  readonly qubits: Uint32Array
  /** By qubit: its line, and its place on it from 0. */
  readonly lineOf: Uint32Array
  readonly placeOf: Uint32Array
}

/** Longest pieces of lines in which every qubit works and successive ones are joined; numbered in order of lines. */
export interface Runs {
  readonly count: number
  /** By run. */
  readonly lineOf: Uint32Array
  /** The qubits of run r are qubits[offsets[r] … offsets[r + 1] − 1], in order along its line. */
  readonly offsets: Uint32Array
  readonly qubits: Uint32Array
  /** By qubit: its run, −1 for qubits that do not work. */
  readonly runOf: Int32Array
}

/** Positions are sums of whole numbers and an overhang in 32 bits; this rounds their noise away. */
const SAME_PLACE = 1e-3

/** By qubit 0 for vertical and 1 for horizontal segments; null when a segment is a point or leans. */
function orientations(segments: Float32Array): Uint8Array | null {
  const horizontal = new Uint8Array(segments.length / 4)
  for (let q = 0; q < horizontal.length; q++) {
    const wide = segments[4 * q] !== segments[4 * q + 2]
    const high = segments[4 * q + 1] !== segments[4 * q + 3]
    if (wide === high) return null
    horizontal[q] = wide ? 1 : 0
  }
  return horizontal
}

/**
 * Finds the lines of a machine from its drawing: qubits of one orientation and one place across belong together.
 * @param segments four numbers a qubit, as in `Fabric.segments`; null where nobody said
 * @returns null without segments, and when the qubits are points, which lie on no line
 */
export function linesOf(segments: Float32Array | null): Lines | null {
  const horizontal = segments && orientations(segments)
  if (!segments || !horizontal) return null
  const order = horizontal.length
  const acrossOf = (q: number): number => segments[4 * q + (horizontal[q] ? 1 : 0)]!
  const alongOf = (q: number): number => {
    const first = 4 * q + (horizontal[q] ? 0 : 1)
    return Math.min(segments[first]!, segments[first + 2]!)
  }
  const sideBySide = (a: number, b: number): number => {
    const difference = acrossOf(a) - acrossOf(b)
    return horizontal[a]! - horizontal[b]! || (Math.abs(difference) > SAME_PLACE ? difference : 0)
  }
  const qubits = Uint32Array.from({ length: order }, (_, q) => q)
  qubits.sort((a, b) => sideBySide(a, b) || alongOf(a) - alongOf(b))
  const lineOf = new Uint32Array(order)
  const placeOf = new Uint32Array(order)
  const starts: number[] = []
  qubits.forEach((q, i) => {
    if (i === 0 || sideBySide(qubits[i - 1]!, q) !== 0) starts.push(i)
    lineOf[q] = starts.length - 1
    placeOf[q] = i - starts[starts.length - 1]!
  })
  return {
    count: starts.length,
    verticals: starts.filter((i) => horizontal[qubits[i]!] === 0).length,
    across: Float32Array.from(starts, (i) => acrossOf(qubits[i]!)),
    offsets: Uint32Array.from([...starts, order]),
    qubits,
    lineOf,
    placeOf,
  }
}

/**
 * Cuts the lines where a qubit does not work, and where the coupler between two successive qubits is missing.
 * @param machine the working graph
 * @param usable 1 for each qubit that works; length machine.order
 */
export function intactRuns(lines: Lines, machine: Graph, usable: Uint8Array): Runs {
  const runOf = new Int32Array(machine.order).fill(-1)
  const lineOf: number[] = []
  const starts: number[] = []
  const kept: number[] = []
  for (let line = 0; line < lines.count; line++) {
    let previous = -1
    for (let i = lines.offsets[line]!; i < lines.offsets[line + 1]!; i++) {
      const q = lines.qubits[i]!
      if (usable[q] === 0) {
        previous = -1
        continue
      }
      if (previous < 0 || edgeBetween(machine, previous, q) < 0) {
        lineOf.push(line)
        starts.push(kept.length)
      }
      runOf[q] = lineOf.length - 1
      kept.push(q)
      previous = q
    }
  }
  return {
    count: lineOf.length,
    lineOf: Uint32Array.from(lineOf),
    offsets: Uint32Array.from([...starts, kept.length]),
    qubits: Uint32Array.from(kept),
    runOf,
  }
}
