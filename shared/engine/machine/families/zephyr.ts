import type { FamilyOf, FamilyRules } from './rules'
import type { LineSet } from './segments'
import { buildSegments } from './segments'

type Zephyr = FamilyOf<'zephyr'>

/**
 * Lines 2(w·t + k) + j of orientation u: a published track (w, k) holds two staggered rows of segments, j = 0 and 1,
 * drawn on neighbouring lines. Qubit (u, w, k, j, z) has the number (((u·(2m + 1) + w)·t + k)·2 + j)·m + z.
 */
function lineSet(m: number, t: number, u: 0 | 1): LineSet {
  const lines = 2 * t * (2 * m + 1)
  return {
    lines,
    perLine: m,
    span: 4 * t,
    start: (line) => (line % 2) * 2 * t,
    id: (line, z) => (u * lines + line) * m + z,
  }
}

/** Zephyr Z(m, t) in the coordinates (u, w, k, j, z) of Boothby, King & Raymond's technical report on it (2021). */
export const zephyr: FamilyRules<Zephyr> = {
  sizes: [
    { field: 'm', least: 1 },
    { field: 't', least: 1 },
  ],
  name: ({ m, t }) => `Z(${m},${t})`,
  qubitCount: ({ m, t }) => 4 * t * m * (2 * m + 1),
  // 16m²t² internal, 4t(2m + 1)(m − 1) external, 2t(4m² − 1) odd.
  couplerCount: ({ m, t }) => 2 * t * ((8 * t + 8) * m * m - 2 * m - 3),
  build: ({ m, t }) =>
    buildSegments({
      vertical: lineSet(m, t, 0),
      horizontal: lineSet(m, t, 1),
      partners: true,
      crossedOnly: false,
    }),
}
