import { MAX_STATED_VARIABLES } from './counted'

/** What the first line and the size line of a Matrix Market file say. */
export interface MatrixMarketKind {
  readonly layout: 'coordinate' | 'array'
  readonly field: 'real' | 'integer'
  readonly symmetry: 'general' | 'symmetric'
}

const BANNER = '%%matrixmarket'
const LAYOUTS = ['coordinate', 'array'] as const
const FIELDS = ['real', 'integer', 'pattern', 'complex'] as const
const SYMMETRIES = ['general', 'symmetric', 'skew-symmetric', 'hermitian'] as const

export const isBanner = (line: string): boolean => line.toLowerCase().startsWith(BANNER)

const isOf = <T extends string>(words: readonly T[], word: string): word is T =>
  (words as readonly string[]).includes(word)

/** Reads the first line; a text says why its kind of matrix is no problem. */
export function readBanner(line: string): MatrixMarketKind | string {
  const [, object, layout = '', field = '', symmetry = '', ...rest] = line.trim().toLowerCase().split(/\s+/)
  if (!isBanner(line) || object !== 'matrix' || rest.length > 0)
    return 'the first line must be "%%MatrixMarket matrix", a layout, a kind of values and a symmetry'
  if (!isOf(LAYOUTS, layout)) return `the layout must be ${LAYOUTS.join(' or ')}, not "${layout.slice(0, 40)}"`
  if (!isOf(FIELDS, field)) return `the values must be real or integer, not "${field.slice(0, 40)}"`
  if (!isOf(SYMMETRIES, symmetry)) return `the symmetry must be general or symmetric, not "${symmetry.slice(0, 40)}"`
  if (field === 'pattern')
    return 'a pattern file says where coefficients stand but not what they are: write it with real or integer values'
  if (field === 'complex') return 'a problem has no complex coefficients: write real or integer values'
  if (symmetry === 'skew-symmetric')
    return 'the two halves of a skew-symmetric matrix cancel in zᵀQz, so that no problem is left: write a general or symmetric matrix'
  if (symmetry === 'hermitian') return 'a hermitian matrix is one of complex values: write it as real symmetric'
  return { layout, field, symmetry }
}

export interface MatrixSize {
  readonly n: number
  /** Values that the file has to hold. */
  readonly count: number
}

/** Reads the size line; a text says what is wrong. */
export function readSize(line: string, kind: MatrixMarketKind, maxDense: number): MatrixSize | string {
  const numbers = line.trim().split(/\s+/)
  const expected = kind.layout === 'coordinate' ? 3 : 2
  const what = kind.layout === 'coordinate' ? 'rows, columns and number of entries' : 'rows and columns'
  if (numbers.length !== expected || !numbers.every((text) => /^\d{1,15}$/.test(text)))
    return `the size line must hold ${what} as ${expected} whole numbers, not "${line.trim().slice(0, 60)}"`
  const [rows, cols, entries] = numbers.map(Number) as [number, number, number | undefined]
  if (rows !== cols) return `the matrix is not square: ${rows} rows and ${cols} columns`
  const most = kind.layout === 'coordinate' ? MAX_STATED_VARIABLES : maxDense
  if (rows > most) return `a ${kind.layout} matrix has at most ${most} rows, not ${rows}`
  if (rows === 0) return 'the matrix is empty'
  const dense = kind.symmetry === 'symmetric' ? (rows * (rows + 1)) / 2 : rows * rows
  return { n: rows, count: entries ?? dense }
}
