import { cellOf, firstPlaceOf, pairsIn } from '#shared/engine/problem/sparsity'
import type { SparsityMeta } from '#shared/schemas/structure'
import { formatCount, formatNumber, formatPercent } from '../format'
import { mixColours } from '../lattice/tokens'
import type { Tokens } from '../lattice/tokens'
import { colourOfStep, scaleOf, stepOf } from './coefficient-scale'
import type { CoefficientScale } from './coefficient-scale'
import { FORM_SYMBOLS } from './graph-words'

/** The answer of the server, unpacked; coefficients are there for small problems only. */
export interface SparsityPicture extends SparsityMeta {
  readonly counts: Uint8Array | Uint16Array | Uint32Array
  /** Places of the two variables of each interaction, in any order. */
  readonly rows?: Uint8Array
  readonly cols?: Uint8Array
  readonly values?: Float64Array
  readonly linear?: Float64Array
}

/** A bin of the raster: of small problems one variable with one variable. */
export interface Cell {
  readonly row: number
  readonly col: number
}

/** Coefficients of a small problem as a full table, symmetric, with the linear ones on the diagonal. */
export interface CellTable {
  readonly scale: CoefficientScale
  readonly values: Float64Array
}

export function cellTable({ variables: n, rows, cols, values, linear }: SparsityPicture): CellTable | null {
  if (!values) return null
  const table = new Float64Array(n * n)
  linear!.forEach((value, i) => (table[i * n + i] = value))
  values.forEach((value, k) => {
    table[rows![k]! * n + cols![k]!] = value
    table[cols![k]! * n + rows![k]!] = value
  })
  return { scale: scaleOf(table), values: table }
}

export function countAt({ bins, counts }: SparsityPicture, { row, col }: Cell): number {
  return counts[row < col ? cellOf(bins, row, col) : cellOf(bins, col, row)]!
}

/** Share of a bin's pairs that interact. */
export function filledShare(picture: SparsityPicture, cell: Cell): number {
  const { bins, variables } = picture
  const pairs = pairsIn(bins, variables, Math.min(cell.row, cell.col), Math.max(cell.row, cell.col))
  return pairs === 0 ? 0 : countAt(picture, cell) / pairs
}

/** A single interaction in a bin of hundreds must still be seen: darkness begins here and grows with the root. */
const FAINTEST = 0.25
export const darknessOf = (share: number): number => (share === 0 ? 0 : FAINTEST + (1 - FAINTEST) * Math.sqrt(share))

/** The steps of darkness in the legend, by share of filled cells. */
export const DARKNESS_STEPS = [0.01, 0.1, 0.5, 1] as const

export const shadeOf = (share: number, { paper, ink }: Pick<Tokens, 'paper' | 'ink'>): string =>
  mixColours(paper, ink, darknessOf(share))

/** The cell at a point of a picture of so many pixels a side. */
export function cellAt({ bins }: Pick<SparsityPicture, 'bins'>, side: number, x: number, y: number): Cell | null {
  const [col, row] = [Math.floor((x / side) * bins), Math.floor((y / side) * bins)]
  return row >= 0 && col >= 0 && row < bins && col < bins ? { row, col } : null
}

const STEPS: Record<string, readonly [number, number]> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
}

/** The cell that a key leads to; null for other keys. Home and End go to the corners. */
export function cellAfter(key: string, from: Cell | null, bins: number, stride = 1): Cell | null {
  const within = (place: number) => Math.min(bins - 1, Math.max(0, place))
  if (key === 'Home') return { row: 0, col: 0 }
  if (key === 'End') return { row: bins - 1, col: bins - 1 }
  const step = STEPS[key]
  if (!step) return null
  return from
    ? { row: within(from.row + stride * step[0]), col: within(from.col + stride * step[1]) }
    : { row: 0, col: 0 }
}

/** `a` or, of a bin, `places 11–15`. */
function namesOf({ bins, variables, labels }: SparsityPicture, bin: number): string {
  const [first, end] = [firstPlaceOf(bins, variables, bin), firstPlaceOf(bins, variables, bin + 1)]
  if (end - first > 1) return `${formatNumber(first + 1)}–${formatNumber(end)}`
  return labels ? labels[first]! : formatNumber(first + 1)
}

/** One cell in words: `a, b: J = −2`, `1–5 with 11–15: 4 of 25 pairs interact`. */
export function cellWords(picture: SparsityPicture, table: CellTable | null, { row, col }: Cell): string {
  const { variables, bins, form } = picture
  const [one, two] = [namesOf(picture, row), namesOf(picture, col)]
  if (table) {
    const value = table.values[row * variables + col]!
    const { linear, interaction } = FORM_SYMBOLS[form]
    if (row === col) return `${one}: ${linear} = ${formatNumber(value)}`
    return value === 0 ? `${one}, ${two}: no interaction` : `${one}, ${two}: ${interaction} = ${formatNumber(value)}`
  }
  const pairs = pairsIn(bins, variables, Math.min(row, col), Math.max(row, col))
  const count = countAt(picture, { row, col })
  if (pairs === 1 && bins === variables) return `${one}, ${two}: ${count === 1 ? 'an interaction' : 'no interaction'}`
  if (pairs === 0) return `${one} with itself`
  const share = formatPercent(count / pairs)
  return `Places ${one} with ${two}: ${formatNumber(count)} of ${formatCount(pairs, 'pair')} interact, ${share}`
}

/** Cells of fewer pixels are filled plainly; in larger ones a hollow middle tells a positive coefficient. */
const HOLLOW_FROM = 7

function paintCells(
  context: CanvasRenderingContext2D,
  side: number,
  n: number,
  table: CellTable,
  tokens: Tokens,
): void {
  const edge = (place: number) => Math.round((place * side) / n)
  for (let row = 0; row < n; row++)
    for (let col = 0; col < n; col++) {
      const value = table.values[row * n + col]!
      if (value === 0) continue
      const [x, y, w, h] = [edge(col), edge(row), edge(col + 1) - edge(col), edge(row + 1) - edge(row)]
      const gap = w >= HOLLOW_FROM ? 1 : 0
      context.fillStyle = colourOfStep(table.scale, stepOf(table.scale, value), tokens)
      context.fillRect(x, y, w - gap, h - gap)
      if (value < 0 || w < HOLLOW_FROM) continue
      const rim = Math.max(2, Math.round(w / 4))
      context.fillStyle = tokens.paper
      context.fillRect(x + rim, y + rim, w - gap - 2 * rim, h - gap - 2 * rim)
    }
}

function paintRaster(context: CanvasRenderingContext2D, side: number, picture: SparsityPicture, tokens: Tokens): void {
  const { bins } = picture
  // Bins narrower than a pixel would vanish between samples: the picture is then drawn bin by bin and shrunk.
  const edge = (place: number) => Math.floor((place * side) / bins)
  for (let row = 0; row < bins; row++)
    for (let col = 0; col < bins; col++) {
      const share = filledShare(picture, { row, col })
      if (share === 0) continue
      context.fillStyle = shadeOf(share, tokens)
      context.fillRect(
        edge(col),
        edge(row),
        Math.max(1, edge(col + 1) - edge(col)),
        Math.max(1, edge(row + 1) - edge(row)),
      )
    }
}

/** Draws the picture over a square of so many pixels; the diagonal of a raster is a hairline. */
export function paintSparsity(
  context: CanvasRenderingContext2D,
  side: number,
  picture: SparsityPicture,
  table: CellTable | null,
  tokens: Tokens,
): void {
  context.fillStyle = tokens.paper
  context.fillRect(0, 0, side, side)
  if (table) {
    paintCells(context, side, picture.variables, table, tokens)
    return
  }
  context.strokeStyle = tokens.rule
  context.beginPath()
  context.moveTo(0, 0)
  context.lineTo(side, side)
  context.stroke()
  paintRaster(context, side, picture, tokens)
}
