import { edgeBetween } from '../../graph/build'
import type { Graph } from '../../graph/graph'
import { sizeOf } from '../../graph/graph'
import { linesOf } from '../../machine/lines'
import type { Lines } from '../../machine/lines'

/**
 * Where the lines of a machine meet. Lines are numbered within their side: 0 … counts[0] − 1 from left to right on side
 * 0 (vertical), 0 … counts[1] − 1 from top to bottom on side 1 (horizontal).
 */
export interface Crossings {
  readonly counts: readonly [number, number]
  /**
   * Place, on a line, of the qubit whose coupler leads to the qubit of a crossing line; −1 where there is no such
   * coupler. The row of line x of side 0 is place[x·counts[1] + y]; that of line y of side 1 begins at
   * rows[1] + y·counts[0].
   */
  readonly place: Int16Array
  /** Beginning of the rows of each side. */
  readonly rows: readonly [number, number]
  /** Slot of place 0 of a line: slotOf[first[side] + line]. A slot is a place on a line; there is one for each qubit. */
  readonly slotOf: Int32Array
  readonly first: readonly [number, number]
  /**
   * Lines that cross each other line at the same qubit as line l does: alikeFrom[first[side] + l] …
   * alikeTo[first[side] + l] − 1, numbered within the side. A part can change between them without any effect on others.
   */
  readonly alikeFrom: Int32Array
  readonly alikeTo: Int32Array
  /** The qubit of a slot. */
  readonly qubits: Uint32Array
  /** 1 for each slot whose qubit does not work. */
  readonly broken: Uint8Array
  /** Missing couplers between successive working qubits of a line that lie before the slot on its line. */
  readonly gaps: Int32Array
}

function slotGaps(lines: Lines, machine: Graph, usable: Uint8Array): Int32Array {
  const gaps = new Int32Array(machine.order)
  for (let line = 0; line < lines.count; line++)
    for (let slot = lines.offsets[line]! + 1; slot < lines.offsets[line + 1]!; slot++) {
      const [a, b] = [lines.qubits[slot - 1]!, lines.qubits[slot]!]
      const missing = usable[a] === 1 && usable[b] === 1 && edgeBetween(machine, a, b) < 0
      gaps[slot] = gaps[slot - 1]! + (missing ? 1 : 0)
    }
  return gaps
}

function crossingPlaces(lines: Lines, machine: Graph, usable: Uint8Array): Int16Array {
  const { verticals, lineOf, placeOf } = lines
  const horizontals = lines.count - verticals
  const place = new Int16Array(2 * verticals * horizontals).fill(-1)
  for (let k = 0; k < sizeOf(machine); k++) {
    let [a, b] = [machine.ends[2 * k]!, machine.ends[2 * k + 1]!]
    if (usable[a] === 0 || usable[b] === 0) continue
    if (lineOf[a]! >= verticals) [a, b] = [b, a]
    const x = lineOf[a]!
    const y = lineOf[b]! - verticals
    if (x >= verticals || y < 0) continue
    place[x * horizontals + y] = placeOf[a]!
    place[verticals * horizontals + y * verticals + x] = placeOf[b]!
  }
  return place
}

/** Whether two lines of a side are crossed at the same places of all lines that cross both. */
function areAlike(place: Int16Array, row: number, stride: number, across: number, a: number, b: number): boolean {
  for (let line = 0; line < across; line++) {
    const atA = place[row + line * stride + a]!
    const atB = place[row + line * stride + b]!
    if (atA >= 0 && atB >= 0 && atA !== atB) return false
  }
  return true
}

/** Cuts the lines of each side into longest stretches of lines that are like the first of the stretch. */
function alikeStretches(place: Int16Array, counts: readonly [number, number]): { from: Int32Array; to: Int32Array } {
  const from = new Int32Array(counts[0] + counts[1])
  const to = new Int32Array(counts[0] + counts[1])
  for (const side of [0, 1] as const) {
    const first = side * counts[0]
    const [count, across] = [counts[side], counts[1 - side]!]
    const otherRow = side === 0 ? counts[0] * counts[1] : 0
    for (let begin = 0, end = 0; begin < count; begin = end) {
      for (end = begin + 1; end < count && areAlike(place, otherRow, count, across, begin, end);) end++
      from.fill(begin, first + begin, first + end)
      to.fill(end, first + begin, first + end)
    }
  }
  return { from, to }
}

/**
 * Reads the lines and their crossings off the drawing of a working machine.
 * @param usable 1 for each qubit that works; length machine.order
 * @param segments four numbers a qubit, as in `Fabric.segments`; null where nobody said
 * @returns null where the qubits lie on no lines, or all lines run the same way
 */
export function crossingsOf(machine: Graph, usable: Uint8Array, segments: Float32Array | null): Crossings | null {
  const lines = linesOf(segments)
  if (!lines || lines.verticals === 0 || lines.verticals === lines.count) return null
  const { verticals, offsets, qubits } = lines
  const horizontals = lines.count - verticals
  const counts = [verticals, horizontals] as const
  const place = crossingPlaces(lines, machine, usable)
  const { from, to } = alikeStretches(place, counts)
  return {
    counts,
    place,
    rows: [0, verticals * horizontals],
    slotOf: Int32Array.from(offsets.subarray(0, lines.count)),
    first: [0, verticals],
    alikeFrom: from,
    alikeTo: to,
    qubits,
    broken: Uint8Array.from(qubits, (q) => (usable[q] === 0 ? 1 : 0)),
    gaps: slotGaps(lines, machine, usable),
  }
}
