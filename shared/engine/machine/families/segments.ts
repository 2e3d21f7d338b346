import { graphFromEdges } from '../../graph/build'
import type { Fabric } from '../fabric'

/**
 * The families whose qubits are straight segments in the plane (Chimera, Pegasus, Zephyr).
 *
 * Vertical lines stand at x = 0, 1, 2, …, horizontal ones at y = 0, 1, 2, …. Every line of an orientation carries the
 * same number of segments end to end, each covering the same number of crossing lines. Couplers follow from that:
 * internal where two segments cross, external between successive segments of a line, odd between partner lines.
 */
export interface LineSet {
  /** Number of lines of this orientation. */
  readonly lines: number
  /** Segments on each line. */
  readonly perLine: number
  /** Crossing lines that one segment covers. */
  readonly span: number
  /** The first crossing line that the first segment of a line covers. */
  readonly start: (line: number) => number
  /** Published number of a segment, counted along its line. */
  readonly id: (line: number, index: number) => number
}

export interface SegmentPattern {
  readonly vertical: LineSet
  readonly horizontal: LineSet
  /** Lines 2i and 2i + 1 are partners: their segments are joined by an odd coupler wherever they lie side by side. */
  readonly partners: boolean
  /** Leave out segments that cross no other. */
  readonly crossedOnly: boolean
}

/** How far a segment reaches beyond its outermost crossings, in line spacings; collinear ones are left 0.4 apart. */
const OVERHANG = 0.3

/** A line set with its starts looked up; segment `index` of `line` has slot `base + line·perLine + index`. */
interface PlacedLines extends LineSet {
  readonly base: number
  readonly starts: Int32Array
}

const placeLines = (set: LineSet, base: number): PlacedLines => ({
  ...set,
  base,
  starts: Int32Array.from({ length: set.lines }, (_, line) => set.start(line)),
})

/** Appends the ends of all internal couplers, as slots: one for each crossing covered by a segment of either line. */
function addCrossings(vertical: PlacedLines, horizontal: PlacedLines, ends: number[]): void {
  for (let x = 0; x < vertical.lines; x++) {
    const top = vertical.starts[x]!
    const bottom = top + vertical.perLine * vertical.span
    for (let y = Math.max(0, top); y < Math.min(bottom, horizontal.lines); y++) {
      const along = Math.floor((x - horizontal.starts[y]!) / horizontal.span)
      if (along < 0 || along >= horizontal.perLine) continue
      const down = Math.floor((y - top) / vertical.span)
      ends.push(vertical.base + x * vertical.perLine + down, horizontal.base + y * horizontal.perLine + along)
    }
  }
}

/** Appends external couplers: successive segments of each line. */
function addSuccessive({ lines, perLine, base }: PlacedLines, ends: number[]): void {
  for (let line = 0; line < lines; line++) {
    const first = base + line * perLine
    for (let index = 1; index < perLine; index++) ends.push(first + index - 1, first + index)
  }
}

/** Appends odd couplers: overlapping segments of the lines 2i and 2i + 1. */
function addPartners({ lines, perLine, base, span, starts }: PlacedLines, ends: number[]): void {
  for (let line = 0; line + 1 < lines; line += 2) {
    const shift = starts[line]! - starts[line + 1]!
    for (let index = 0; index < perLine; index++) {
      const from = index * span + shift
      const lowest = Math.floor(from / span)
      const highest = Math.ceil(from / span)
      for (let other = Math.max(0, lowest); other <= Math.min(highest, perLine - 1); other++)
        ends.push(base + line * perLine + index, base + (line + 1) * perLine + other)
    }
  }
}

/** Published numbers by slot; slots that are left out get −1. */
function publishedNumbers(sets: readonly PlacedLines[], kept: Uint8Array): Int32Array {
  const ids = new Int32Array(kept.length)
  for (const { lines, perLine, base, id } of sets)
    for (let line = 0; line < lines; line++)
      for (let index = 0; index < perLine; index++) {
        const slot = base + line * perLine + index
        ids[slot] = kept[slot] ? id(line, index) : -1
      }
  return ids
}

/** Dense index of each kept slot in ascending order of published number, −1 for the others; and the sorted numbers. */
function denseOrder(idBySlot: Int32Array): { indexOf: Int32Array; ids: Uint32Array } {
  const ids = Uint32Array.from(idBySlot.filter((id) => id >= 0)).sort()
  const indexById = new Map<number, number>()
  ids.forEach((id, index) => indexById.set(id, index))
  return { indexOf: idBySlot.map((id) => indexById.get(id) ?? -1), ids }
}

function writeSegments(set: PlacedLines, isVertical: boolean, indexOf: Int32Array, segments: Float32Array): void {
  for (let line = 0; line < set.lines; line++)
    for (let index = 0; index < set.perLine; index++) {
      const qubit = indexOf[set.base + line * set.perLine + index]!
      if (qubit < 0) continue
      const from = set.starts[line]! + index * set.span - OVERHANG
      const to = set.starts[line]! + (index + 1) * set.span - 1 + OVERHANG
      segments.set(isVertical ? [line, from, line, to] : [from, line, to, line], 4 * qubit)
    }
}

/** Dense edge list of the couplers between kept slots. */
function denseEnds(slotEnds: readonly number[], indexOf: Int32Array): Uint32Array {
  const ends = new Uint32Array(slotEnds.length)
  let length = 0
  for (let k = 0; k < slotEnds.length; k += 2) {
    const a = indexOf[slotEnds[k]!]!
    const b = indexOf[slotEnds[k + 1]!]!
    if (a < 0 || b < 0) continue
    ends[length++] = a
    ends[length++] = b
  }
  return ends.subarray(0, length)
}

/** Builds graph, published numbers and drawing of a segment family; time linear in its couplers, plus their sorting. */
export function buildSegments(pattern: SegmentPattern): Omit<Fabric, 'family'> {
  const vertical = placeLines(pattern.vertical, 0)
  const horizontal = placeLines(pattern.horizontal, vertical.lines * vertical.perLine)
  const kept = new Uint8Array(horizontal.base + horizontal.lines * horizontal.perLine)
  const slotEnds: number[] = []
  addCrossings(vertical, horizontal, slotEnds)
  if (pattern.crossedOnly) for (const slot of slotEnds) kept[slot] = 1
  else kept.fill(1)
  for (const set of [vertical, horizontal]) {
    addSuccessive(set, slotEnds)
    if (pattern.partners) addPartners(set, slotEnds)
  }
  const { indexOf, ids } = denseOrder(publishedNumbers([vertical, horizontal], kept))
  const segments = new Float32Array(4 * ids.length)
  writeSegments(vertical, true, indexOf, segments)
  writeSegments(horizontal, false, indexOf, segments)
  return { graph: graphFromEdges(ids.length, denseEnds(slotEnds, indexOf)), ids, segments }
}
