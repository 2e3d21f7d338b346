/**
 * A decorative plate: espaliered trees whose arms and shoots cross as chains do on a lattice. Each tree is a trunk with
 * pairs of arms that run out along a row and turn up along a column. Rows and columns are woven: over and under alternate.
 */

export type Inlay = 'plain' | 'line' | 'dots'
export const INLAYS: readonly Inlay[] = ['plain', 'line', 'dots']

export interface Tree {
  trunk: number
  foot: number
  top: number
  inlay: Inlay
  arms: readonly { row: number; left: number; right: number; leftTop: number; rightTop: number }[]
}

interface Band {
  vertical: boolean
  line: number
  from: number
  to: number
  tree: number
  inlay: Inlay
}

export interface PlateDrawing {
  /** Path data by layer, lowest first; every layer has the same band width. */
  layers: { inlay: Inlay; d: string; casing: string; layer: 'columns' | 'rows' | 'over' }[]
  /** Thin lines on which the bands lie. */
  hairlines: string
  /** Where a tree turns a corner or an arm leaves the trunk. */
  joints: { x: number; y: number }[]
}

/** Cells are 20 by 20: dots every 10 then meet again after each crossing. */
export const CELL = 20

function bandsOf(tree: Tree, index: number): Band[] {
  const common = { tree: index, inlay: tree.inlay }
  const bands: Band[] = [{ ...common, vertical: true, line: tree.trunk, from: tree.top, to: tree.foot }]
  for (const arm of tree.arms) {
    bands.push({ ...common, vertical: false, line: arm.row, from: arm.left, to: arm.right })
    if (arm.leftTop < arm.row) bands.push({ ...common, vertical: true, line: arm.left, from: arm.leftTop, to: arm.row })
    if (arm.rightTop < arm.row)
      bands.push({ ...common, vertical: true, line: arm.right, from: arm.rightTop, to: arm.row })
  }
  return bands
}

const center = (line: number) => line * CELL + CELL / 2

function segment(band: Band): string {
  const [from, to] = [center(band.from), center(band.to)]
  return band.vertical ? `M${center(band.line)} ${from}V${to}` : `M${from} ${center(band.line)}H${to}`
}

const covers = (band: Band, line: number) => band.from <= line && line <= band.to

/** Parts of columns that pass over a row: every second crossing, as in a weave. */
function overpasses(columns: Band[], rows: Band[]): Band[] {
  const parts: Band[] = []
  for (const column of columns) {
    for (const row of rows) {
      const crosses = covers(column, row.line) && covers(row, column.line) && column.tree !== row.tree
      if (crosses && (column.line + row.line) % 2 === 0) parts.push({ ...column, from: row.line, to: row.line })
    }
  }
  return parts
}

function overpass(band: Band, reach = CELL / 2): string {
  return `M${center(band.line)} ${center(band.from) - reach}v${2 * reach}`
}

/** The casing ends before its band does, else a seam would show across the column. */
const overpassCasing = (band: Band) => overpass(band, CELL / 2 - 1)

function jointsOf(trees: readonly Tree[]) {
  return trees.flatMap((tree) =>
    tree.arms.flatMap((arm) =>
      [arm.left, tree.trunk, arm.right].map((line) => ({ x: center(line), y: center(arm.row) })),
    ),
  )
}

export function drawPlate(trees: readonly Tree[]): PlateDrawing {
  const bands = trees.flatMap(bandsOf)
  const columns = bands.filter((band) => band.vertical)
  const rows = bands.filter((band) => !band.vertical)
  const over = overpasses(columns, rows)
  const layers: PlateDrawing['layers'] = []
  for (const [layer, parts, draw, drawCasing] of [
    ['columns', columns, segment, segment],
    ['rows', rows, segment, segment],
    ['over', over, (band: Band) => overpass(band), overpassCasing],
  ] as const) {
    for (const inlay of INLAYS) {
      const chosen = parts.filter((band) => band.inlay === inlay)
      if (chosen.length === 0) continue
      layers.push({ layer, inlay, d: chosen.map(draw).join(''), casing: chosen.map(drawCasing).join('') })
    }
  }
  const hairlines = bands.map((band) => segment({ ...band, from: band.from - 3, to: band.to + 3 })).join('')
  return { layers, hairlines, joints: jointsOf(trees) }
}
