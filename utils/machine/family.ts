import type { PublishedFamily } from '#shared/engine/machine/fabric'
import { couplerCount, familyName, familyProblems, qubitCount } from '#shared/engine/machine/family'

/** A family as it stands in the form: a size that was cleared or cannot be read is null or NaN. */
export interface FamilyDraft {
  kind: PublishedFamily['kind']
  m: number | null
  n: number | null
  t: number | null
  trimmed: boolean
  width: number | null
  height: number | null
  depth: number | null
  rows: number | null
  columns: number | null
}

export type SizeField = Exclude<keyof FamilyDraft, 'kind' | 'trimmed'>

export interface SizeText {
  field: SizeField
  label: string
  unit?: string
  hint: string
}

export const FAMILY_START: FamilyDraft = {
  kind: 'pegasus',
  m: 6,
  n: 6,
  t: 4,
  trimmed: true,
  width: 24,
  height: 24,
  depth: 6,
  rows: 8,
  columns: 8,
}

const GRID_SIZES: readonly SizeText[] = [
  { field: 'width', label: 'Width', unit: 'qubits', hint: 'Qubits in a row, at least 1.' },
  { field: 'height', label: 'Height', unit: 'qubits', hint: 'Qubits in a column, at least 1.' },
]

/** The families in the order in which the form offers them, with what sets each apart. */
export const FAMILIES: readonly {
  kind: PublishedFamily['kind']
  title: string
  what: string
  sizes: readonly SizeText[]
}[] = [
  {
    kind: 'chimera',
    title: 'Chimera',
    what: 'Cells of vertical and horizontal qubits, joined to the cells beside them; at most t + 2 couplers a qubit.',
    sizes: [
      { field: 'm', label: 'Rows m', unit: 'cells', hint: 'Cells from top to bottom, 1 to 1 000.' },
      { field: 'n', label: 'Columns n', unit: 'cells', hint: 'Cells from left to right, 1 to 1 000.' },
      { field: 't', label: 'Half cell t', unit: 'qubits', hint: 'Qubits in each half of a cell, 1 to 64.' },
    ],
  },
  {
    kind: 'pegasus',
    title: 'Pegasus',
    what: 'Long crossing qubits with internal, external and odd couplers; at most 15 couplers a qubit.',
    sizes: [{ field: 'm', label: 'Size m', hint: 'The number in P(m), 2 to 1 000.' }],
  },
  {
    kind: 'zephyr',
    title: 'Zephyr',
    what: 'Longer crossing qubits with two odd couplers on either side; at most 4t + 4 couplers a qubit.',
    sizes: [
      { field: 'm', label: 'Size m', hint: 'The first number in Z(m, t), 1 to 1 000.' },
      { field: 't', label: 'Tracks t', hint: 'The second number in Z(m, t), 1 to 64.' },
    ],
  },
  {
    kind: 'king',
    title: 'King’s graph',
    what: 'A board of points, each coupled to the eight around it.',
    sizes: GRID_SIZES,
  },
  { kind: 'square', title: 'Square grid', what: 'A board of points, each coupled to four.', sizes: GRID_SIZES },
  {
    kind: 'cubic',
    title: 'Cubic grid',
    what: 'Layers of square grids, each point coupled to those above and below it as well: at most six.',
    sizes: [...GRID_SIZES, { field: 'depth', label: 'Depth', unit: 'layers', hint: 'Layers, at least 1.' }],
  },
  {
    kind: 'heavy-hex',
    title: 'Heavy hexagons',
    what: 'Hexagons with a qubit on every corner and on the middle of every side; at most three couplers a qubit.',
    sizes: [
      { field: 'rows', label: 'Rows', unit: 'hexagons', hint: 'Hexagons from top to bottom, at least 1.' },
      { field: 'columns', label: 'Columns', unit: 'hexagons', hint: 'Hexagons from left to right, at least 1.' },
    ],
  },
]

export const familyTextOf = (kind: PublishedFamily['kind']) => FAMILIES.find((family) => family.kind === kind)!

const size = (value: number | null): number => value ?? Number.NaN

/** The engine's family; sizes that are not given become NaN, which its checks name. */
export function familyOf(draft: FamilyDraft): PublishedFamily {
  const m = size(draft.m)
  switch (draft.kind) {
    case 'chimera':
      return { kind: draft.kind, m, n: size(draft.n), t: size(draft.t) }
    case 'pegasus':
      return { kind: draft.kind, m, trimmed: draft.trimmed }
    case 'zephyr':
      return { kind: draft.kind, m, t: size(draft.t) }
    case 'king':
    case 'square':
      return { kind: draft.kind, width: size(draft.width), height: size(draft.height) }
    case 'cubic':
      return { kind: draft.kind, width: size(draft.width), height: size(draft.height), depth: size(draft.depth) }
    case 'heavy-hex':
      return { kind: draft.kind, rows: size(draft.rows), columns: size(draft.columns) }
  }
}

export interface FamilyFigures {
  name: string
  qubits: number
  couplers: number
}

/** What the engine found wrong, with the size named as the form names it. */
function inFormWords(problem: string, kind: PublishedFamily['kind']): string {
  const { sizes } = familyTextOf(kind)
  return problem
    .replace(/^\w+(?= must be)/, (name) => sizes.find(({ field }) => field === name)?.label ?? name)
    .replace('not NaN', 'and is not given')
}

/** Name and counts of the family, or what is wrong with its sizes. */
export function readFamily(draft: FamilyDraft): {
  family: PublishedFamily
  figures: FamilyFigures | null
  problems: string[]
} {
  const family = familyOf(draft)
  const problems = familyProblems(family).map((problem) => inFormWords(problem, draft.kind))
  if (problems.length > 0) return { family, figures: null, problems }
  return {
    family,
    figures: { name: familyName(family), qubits: qubitCount(family), couplers: couplerCount(family) },
    problems,
  }
}
