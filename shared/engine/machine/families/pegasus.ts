import type { FamilyOf, FamilyRules } from './rules'
import type { LineSet } from './segments'
import { buildSegments } from './segments'

type Pegasus = FamilyOf<'pegasus'>

const LINES_PER_TILE = 12

/** Where the segments of line k of a tile start, from the published offset lists. */
const VERTICAL_OFFSETS = [2, 2, 2, 2, 10, 10, 10, 10, 6, 6, 6, 6]
const HORIZONTAL_OFFSETS = [6, 6, 6, 6, 2, 2, 2, 2, 10, 10, 10, 10]

/** Lines 12w + k of orientation u; qubit (u, w, k, z) has the number ((u·m + w)·12 + k)·(m − 1) + z. */
function lineSet(m: number, u: 0 | 1, offsets: readonly number[]): LineSet {
  const lines = LINES_PER_TILE * m
  return {
    lines,
    perLine: m - 1,
    span: LINES_PER_TILE,
    start: (line) => offsets[line % LINES_PER_TILE]!,
    id: (line, z) => (u * lines + line) * (m - 1) + z,
  }
}

/**
 * Pegasus P(m) in the coordinates (u, w, k, z) and with the offset lists of Boothby, Bunyk, Raymond & Roy,
 * arXiv:2003.00133 (2020). The trimmed fabric leaves out the 8(m − 1) segments on the outermost lines that cross no
 * other; the rest keep their numbers.
 */
export const pegasus: FamilyRules<Pegasus> = {
  sizes: [{ field: 'm', least: 2 }],
  name: ({ m, trimmed }) => (trimmed ? `P(${m})` : `P(${m}) untrimmed`),
  qubitCount: ({ m, trimmed }) => (trimmed ? 8 * (3 * m - 1) * (m - 1) : 24 * m * (m - 1)),
  // 144(m − 1)² internal, 24m(m − 2) external, 12m(m − 1) odd; trimming takes 8(m − 2) external and 4(m − 1) odd ones.
  couplerCount: ({ m, trimmed }) => (trimmed ? 180 * m * m - 360 * m + 164 : 180 * m * m - 348 * m + 144),
  build: ({ m, trimmed }) =>
    buildSegments({
      vertical: lineSet(m, 0, VERTICAL_OFFSETS),
      horizontal: lineSet(m, 1, HORIZONTAL_OFFSETS),
      partners: true,
      crossedOnly: trimmed,
    }),
}
