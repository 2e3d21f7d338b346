import { graphFromEdges } from '../../graph/build'
import type { Fabric } from '../fabric'
import type { FamilyOf, FamilyRules } from './rules'

type HeavyHex = FamilyOf<'heavy-hex'>

/** A hexagon's sides are two line spacings long, so that the qubits on their middles are one from those on their ends. */
const ACROSS = Math.sqrt(3)

/**
 * Corners lie on rows + 1 zigzag lines, row 0 … rows; line i has corners at columns 0 … 2·columns + 1, of which the
 * first and the last line lack the one that would belong to no hexagon. A corner whose column is as odd as its line
 * goes down to the next line, the others up to the one before.
 */
function cornerColumns({ rows, columns }: HeavyHex, line: number): { first: number; last: number } {
  if (line === 0) return { first: 0, last: 2 * columns }
  if (line < rows) return { first: 0, last: 2 * columns + 1 }
  const shift = (rows - 1) % 2
  return { first: shift, last: 2 * columns + shift }
}

const goesDown = (line: number, column: number): boolean => (line + column) % 2 === 0

/** Qubits with their places and couplers, numbered as they are added. */
class HeavyHexBuilder {
  readonly places: number[] = []
  readonly ends: number[] = []
  /** Qubits on the middles of the sides that hang from the line above, by column. */
  private hanging = new Map<number, number>()
  private cornersDown: [column: number, corner: number][] = []

  constructor(private readonly family: HeavyHex) {}

  private add(x: number, y: number): number {
    this.places.push(x, y, x, y)
    return this.places.length / 4 - 1
  }

  /** The corners of a line with the qubits between them, from left to right. */
  addLine(line: number): void {
    const { first, last } = cornerColumns(this.family, line)
    const heightOf = (column: number): number => 3 * line + (goesDown(line, column) ? 1 : 0)
    for (let column = first, left = -1; column <= last; column++) {
      const corner = this.add(ACROSS * column, heightOf(column))
      if (left >= 0) this.ends.push(left, corner)
      const above = this.hanging.get(column)
      if (above !== undefined) this.ends.push(above, corner)
      if (goesDown(line, column)) this.cornersDown.push([column, corner])
      if (column === last) break
      left = this.add(ACROSS * (column + 0.5), 3 * line + 0.5)
      this.ends.push(corner, left)
    }
  }

  /** The qubits on the middles of the upright sides below a line, from left to right. */
  addUprights(line: number): void {
    this.hanging = new Map()
    for (const [column, corner] of this.cornersDown) {
      const middle = this.add(ACROSS * column, 3 * line + 2)
      this.ends.push(corner, middle)
      this.hanging.set(column, middle)
    }
    this.cornersDown = []
  }
}

function buildHeavyHex(family: HeavyHex): Omit<Fabric, 'family'> {
  const builder = new HeavyHexBuilder(family)
  for (let line = 0; line <= family.rows; line++) {
    builder.addLine(line)
    if (line < family.rows) builder.addUprights(line)
  }
  const order = builder.places.length / 4
  return {
    graph: graphFromEdges(order, builder.ends),
    ids: Uint32Array.from({ length: order }, (_, q) => q),
    segments: Float32Array.from(builder.places),
  }
}

/**
 * Heavy-hexagon lattice: `rows` rows of `columns` hexagons, every other row half a hexagon to the right, with a qubit on
 * every corner and on the middle of every side (Chamberland, Zhu, Yoder, Hertzberg & Cross, Phys. Rev. X 10, 011022,
 * 2020; the outline and the numbers are ours). Numbered as one reads it: each zigzag line from left to right, corners
 * and the sides between them in turn, then the upright sides below it.
 */
export const heavyHex: FamilyRules<HeavyHex> = {
  sizes: [
    { field: 'rows', least: 1 },
    { field: 'columns', least: 1 },
  ],
  name: ({ rows, columns }) => `heavy hexagons ${rows}×${columns}`,
  // 2rc + 2r + 2c corners and 3rc + 2r + 2c − 1 sides of the hexagonal lattice; each side becomes two couplers.
  qubitCount: ({ rows, columns }) => 5 * rows * columns + 4 * rows + 4 * columns - 1,
  couplerCount: ({ rows, columns }) => 6 * rows * columns + 4 * rows + 4 * columns - 2,
  build: buildHeavyHex,
}
