import { groupDigits } from '../../digits'
import { sizeOf } from '../../graph/graph'
import { largeClique } from '../../problem/clique'
import { Contraction } from '../../problem/contraction'
import type { EmbeddingTask } from '../task'
import { infeasibility } from './infeasibility'
import type { Infeasibility } from './infeasibility'

/** Edges that a planar graph of n ≥ 3 vertices has at most (Euler's formula). */
export const mostPlanarEdges = (vertices: number): number => 3 * vertices - 6

/** Whether the machine is known to be planar, with or without defects: square grids and heavy hexagons are. */
export const isPlanar = ({ family }: Pick<EmbeddingTask, 'family'>): boolean =>
  family?.kind === 'square' || family?.kind === 'heavy-hex'

/**
 * Minors of a planar machine are planar, and so are the minors of any problem that it holds: contracts the problem, and
 * looks for a minor with more edges than a planar graph can have. Finds most problems that are not planar, not all.
 * @param work list entries that may be read
 */
export function brokenPlanarity(task: EmbeddingTask, work: number): Infeasibility | null {
  if (!isPlanar(task) || sizeOf(task.problem) < 9) return null
  const contraction = new Contraction(task.problem)
  for (; contraction.vertices >= 3 && contraction.work < work; contraction.contractLeast(work)) {
    const { edges, vertices } = contraction
    const most = mostPlanarEdges(vertices)
    if (edges <= most) continue
    const merged = vertices < task.problem.order ? 'Merged along interactions, the problem has' : 'The problem has'
    const message = `${merged} ${groupDigits(vertices)} variables with ${groupDigits(edges)} interactions; on a machine whose couplers never cross, ${groupDigits(vertices)} have at most ${groupDigits(most)}: ${groupDigits(edges - most)} too many.`
    return infeasibility('too many interactions for a planar machine', edges, most, message)
  }
  const clique = largeClique(task.problem, { atLeast: 5, maxWork: work }).length
  if (clique < 5) return null
  const message = `The problem contains ${groupDigits(clique)} variables that all interact with each other; a machine whose couplers never cross holds at most 4 such: ${groupDigits(clique - 4)} too many.`
  return infeasibility('clique larger than the machine can hold', clique, 4, message)
}
