import type { NamedProblem } from '../../../../../shared/engine/problem/difference/match-variables'

/** A problem from linear coefficients by label and interactions by two labels with a space between; zeros are left out. */
export function buildProblem(
  linear: Record<string, number>,
  pairs: Record<string, number>,
  offset: number,
): NamedProblem {
  const labels = Object.keys(linear)
  const terms = Object.entries(pairs)
    .map(([pair, value]) => {
      const [a, b] = pair.split(' ').map((label) => labels.indexOf(label)) as [number, number]
      return { row: Math.min(a, b), col: Math.max(a, b), value }
    })
    .filter(({ value }) => value !== 0)
    .sort((x, y) => x.row - y.row || x.col - y.col)
  return {
    labels,
    problem: {
      n: labels.length,
      linear: Float64Array.from(Object.values(linear)),
      rows: Uint32Array.from(terms, ({ row }) => row),
      cols: Uint32Array.from(terms, ({ col }) => col),
      values: Float64Array.from(terms, ({ value }) => value),
      offset,
    },
  }
}
