import type { Graph } from '../../graph/graph'
import type { Lines, Runs } from '../../machine/lines'
import { intactRuns, linesOf } from '../../machine/lines'

const DEFAULTS = {
  /** Runs of one orientation that are looked at; of more, the longest are kept, so that tables stay small. */
  largestRuns: 2048,
}

/** The intact runs of one orientation, in order of their lines. */
export interface RunSet {
  readonly count: number
  /** By run: x of a vertical run, y of a horizontal one. */
  readonly across: Float32Array
  /** By run: the coordinates along it that its first and last qubit reach to. */
  readonly from: Float32Array
  readonly to: Float32Array
  /** The qubits of run r are qubits[offsets[r] … offsets[r + 1] − 1], in order of their coordinate. */
  readonly offsets: Uint32Array
  readonly qubits: Uint32Array
}

/** Vertical against horizontal runs, and where they cross. */
export interface Crossings {
  readonly vertical: RunSet
  readonly horizontal: RunSet
  /**
   * Tables of vertical.count rows: entry v·horizontal.count + h is the place along the vertical (the horizontal) run of
   * the qubit that a working coupler joins to the other run, −1 where there is none.
   */
  readonly alongVertical: Int16Array
  readonly alongHorizontal: Int16Array
}

/** Numbers of the runs of one orientation, the longest when there are too many. */
function chosenRuns(lines: Lines, runs: Runs, horizontal: boolean): number[] {
  const length = (r: number): number => runs.offsets[r + 1]! - runs.offsets[r]!
  const all = Array.from({ length: runs.count }, (_, r) => r).filter(
    (r) => runs.lineOf[r]! >= lines.verticals === horizontal,
  )
  if (all.length <= DEFAULTS.largestRuns) return all
  return all
    .sort((a, b) => length(b) - length(a) || a - b)
    .slice(0, DEFAULTS.largestRuns)
    .sort((a, b) => a - b)
}

function runSet(lines: Lines, runs: Runs, segments: Float32Array, horizontal: boolean): RunSet {
  const chosen = chosenRuns(lines, runs, horizontal)
  const along = horizontal ? 0 : 1
  const offsets = new Uint32Array(chosen.length + 1)
  const qubits: number[] = []
  chosen.forEach((r, k) => {
    for (let i = runs.offsets[r]!; i < runs.offsets[r + 1]!; i++) qubits.push(runs.qubits[i]!)
    offsets[k + 1] = qubits.length
  })
  const endOf = (q: number, end: 0 | 2): number => segments[4 * q + along + end]!
  return {
    count: chosen.length,
    across: Float32Array.from(chosen, (r) => lines.across[runs.lineOf[r]!]!),
    from: Float32Array.from(chosen, (_, k) => Math.min(endOf(qubits[offsets[k]!]!, 0), endOf(qubits[offsets[k]!]!, 2))),
    to: Float32Array.from(chosen, (_, k) =>
      Math.max(endOf(qubits[offsets[k + 1]! - 1]!, 0), endOf(qubits[offsets[k + 1]! - 1]!, 2)),
    ),
    offsets,
    qubits: Uint32Array.from(qubits),
  }
}

/** By qubit: its run in the set and its place on it, −1 elsewhere. */
function locate(set: RunSet, order: number): { runOf: Int32Array; placeOf: Int32Array } {
  const runOf = new Int32Array(order).fill(-1)
  const placeOf = new Int32Array(order).fill(-1)
  for (let r = 0; r < set.count; r++)
    for (let i = set.offsets[r]!; i < set.offsets[r + 1]!; i++) {
      runOf[set.qubits[i]!] = r
      placeOf[set.qubits[i]!] = i - set.offsets[r]!
    }
  return { runOf, placeOf }
}

/**
 * Reads the runs of a machine and their crossings off its drawing and its working couplers.
 * @returns null where the machine has no lines
 */
export function crossingsOf(machine: Graph, usable: Uint8Array, segments: Float32Array | null): Crossings | null {
  const lines = linesOf(segments)
  if (!lines || !segments) return null
  const runs = intactRuns(lines, machine, usable)
  const vertical = runSet(lines, runs, segments, false)
  const horizontal = runSet(lines, runs, segments, true)
  const ofVertical = locate(vertical, machine.order)
  const ofHorizontal = locate(horizontal, machine.order)
  const alongVertical = new Int16Array(vertical.count * horizontal.count).fill(-1)
  const alongHorizontal = new Int16Array(vertical.count * horizontal.count).fill(-1)
  for (let k = 0; k < machine.ends.length; k += 2) {
    const [a, b] = [machine.ends[k]!, machine.ends[k + 1]!]
    const [up, flat] = ofVertical.runOf[a]! >= 0 ? [a, b] : [b, a]
    const v = ofVertical.runOf[up]!
    const h = ofHorizontal.runOf[flat]!
    if (v < 0 || h < 0) continue
    alongVertical[v * horizontal.count + h] = ofVertical.placeOf[up]!
    alongHorizontal[v * horizontal.count + h] = ofHorizontal.placeOf[flat]!
  }
  return { vertical, horizontal, alongVertical, alongHorizontal }
}
