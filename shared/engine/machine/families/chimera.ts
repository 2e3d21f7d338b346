import type { FamilyOf, FamilyRules } from './rules'
import { buildSegments } from './segments'

type Chimera = FamilyOf<'chimera'>

/**
 * Chimera C(m, n, t): m rows and n columns of cells K_{t,t}. Qubit (i, j, u, k) of cell row i, cell column j,
 * orientation u (0 vertical, 1 horizontal) and place k in the cell has the number ((i·n + j)·2 + u)·t + k
 * (Bunyk et al., Architectural considerations in the design of a superconducting quantum annealing processor, 2014).
 */
export const chimera: FamilyRules<Chimera> = {
  sizes: [
    { field: 'm', least: 1 },
    { field: 'n', least: 1 },
    { field: 't', least: 1 },
  ],
  name: ({ m, n, t }) => `C(${m},${n},${t})`,
  qubitCount: ({ m, n, t }) => 2 * m * n * t,
  couplerCount: ({ m, n, t }) => m * n * t * t + t * n * (m - 1) + t * m * (n - 1),
  build: ({ m, n, t }) => {
    const number = (i: number, j: number, u: number, k: number): number => ((i * n + j) * 2 + u) * t + k
    const start = (): number => 0
    return buildSegments({
      vertical: {
        lines: n * t,
        perLine: m,
        span: t,
        start,
        id: (line, i) => number(i, Math.floor(line / t), 0, line % t),
      },
      horizontal: {
        lines: m * t,
        perLine: n,
        span: t,
        start,
        id: (line, j) => number(Math.floor(line / t), j, 1, line % t),
      },
      partners: false,
      crossedOnly: false,
    })
  },
}
