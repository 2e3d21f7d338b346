import type { PublishedFamily } from '../../machine/fabric'
import type { Fitter } from './fitter'
import { emptyTemplate, FIRST_ARM, setMeeting } from './template'
import type { Template } from './template'

type King = Extract<PublishedFamily, { kind: 'king' }>

const DEFAULTS = {
  /** Places of the network that are tried, those with fewest broken qubits first. */
  tries: 40,
}

/** Where the network lies: its first column and row, and whether columns and rows change parts. */
interface Place {
  readonly column: number
  readonly row: number
  readonly transposed: boolean
}

/** The qubit at a column and row of the network, −1 outside the board. */
function qubitOf({ width, height }: King, place: Place, column: number, row: number): number {
  const [x, y] = place.transposed ? [place.row + row, place.column + column] : [place.column + column, place.row + row]
  return x < width && y < height ? y * width + x : -1
}

/**
 * The column of each of n chains in each of n − 1 rows, at chain·(n − 1) + row: in every second gap between columns the
 * chains change places from one row to the next, along the two diagonals of a square. By the odd-even transposition
 * sort of n items in n rounds (Knuth, The Art of Computer Programming 3, 5.3.4) each two chains are neighbours in some
 * row.
 */
export function transpositionColumns(n: number): Int32Array {
  const rows = Math.max(1, n - 1)
  const columns = new Int32Array(n * rows)
  const order = Int32Array.from({ length: n }, (_, chain) => chain)
  for (let row = 0; row < rows; row++) {
    order.forEach((chain, column) => (columns[chain * rows + row] = column))
    for (let left = (row + 1) % 2; left + 1 < n; left += 2) {
      const moved = order[left]!
      order[left] = order[left + 1]!
      order[left + 1] = moved
    }
  }
  return columns
}

function networkTemplate(family: King, place: Place, n: number): Template {
  const rows = Math.max(1, n - 1)
  const columns = transpositionColumns(n)
  const arms = Array.from({ length: n }, (_, chain): [Uint32Array, Uint32Array] => [
    Uint32Array.from({ length: rows }, (_, row) => qubitOf(family, place, columns[chain * rows + row]!, row)),
    new Uint32Array(0),
  ])
  const template = emptyTemplate(arms)
  for (let row = 0; row < rows; row++) {
    const at = new Int32Array(n)
    for (let chain = 0; chain < n; chain++) at[columns[chain * rows + row]!] = chain
    for (let c = 1; c < n; c++) setMeeting(template, [at[c - 1]!, FIRST_ARM, row], [at[c]!, FIRST_ARM, row])
  }
  return template
}

function brokenQubits(family: King, usable: Uint8Array, place: Place, n: number): number {
  let broken = 0
  for (let column = 0; column < n; column++)
    for (let row = 0; row < Math.max(1, n - 1); row++) {
      const q = qubitOf(family, place, column, row)
      if (q < 0) return Infinity
      if (usable[q] === 0) broken++
    }
  return broken
}

/** Places without broken qubits, lying and standing. */
function intactPlaces(family: King, usable: Uint8Array, n: number): Place[] {
  const places: Place[] = []
  for (const transposed of [false, true]) {
    const [columns, rows] = transposed ? [family.height, family.width] : [family.width, family.height]
    for (let column = 0; column + n <= columns; column++)
      for (let row = 0; row + Math.max(1, n - 1) <= rows; row++) {
        const place = { column, row, transposed }
        if (brokenQubits(family, usable, place, n) === 0) places.push(place)
        if (places.length >= DEFAULTS.tries) return places
      }
  }
  return places
}

/** Fits the problem into a transposition network on a part of a king's graph that is whole; returns whether it did. */
export function fitNetwork(fitter: Fitter, family: King): boolean {
  const { core, task, attempt } = fitter
  if (core.order === 0) return false
  for (const place of intactPlaces(family, task.usable, core.order)) {
    if (attempt.watch.shouldStop(0)) return false
    if (fitter.fit(networkTemplate(family, place, core.order))) return true
  }
  return false
}
