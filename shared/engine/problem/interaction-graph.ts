import { graphFromSortedEdges } from '../graph/build'
import type { Graph } from '../graph/graph'
import type { Problem } from './problem'

/** The graph whose vertices are the variables and whose edge k is interaction k. Linear: a problem's pairs are sorted. */
export function interactionGraph(problem: Problem): Graph {
  const { rows, cols } = problem
  const ends = new Uint32Array(2 * rows.length)
  for (let k = 0; k < rows.length; k++) {
    ends[2 * k] = rows[k]!
    ends[2 * k + 1] = cols[k]!
  }
  return graphFromSortedEdges(problem.n, ends)
}
