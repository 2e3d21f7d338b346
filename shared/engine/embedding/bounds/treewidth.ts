import { groupDigits } from '../../digits'
import type { Graph } from '../../graph/graph'
import { largeClique } from '../../problem/clique'
import { treewidthLowerBound, treewidthReach } from '../../problem/treewidth-lower'
import type { LowerBoundLimits } from '../../problem/treewidth-lower'
import type { EmbeddingTask } from '../task'
import { familyTreewidth } from './family-treewidth'
import { infeasibility } from './infeasibility'
import type { Infeasibility } from './infeasibility'
import { machineTreewidthBounds } from './machine-treewidth'

/** How much work may go into the problem's lower bounds. */
export type Effort = Omit<LowerBoundLimits, 'enough'> & { readonly cliqueWork: number }

const DEFAULTS = {
  /** Problems that are unlikely to reach this share of the intact family's treewidth are let through unchecked. */
  worthwhileShare: 0.8,
  /** The front of one direction is seldom shorter than this share of another's. */
  improvement: 0.9,
}

/** Where a clique is large enough, it is named: that is easier to grasp than treewidth. */
function proofOf(problem: Graph, lower: number, width: number, cliqueWork: number): Infeasibility {
  const clique = largeClique(problem, { atLeast: width + 2, maxWork: cliqueWork }).length
  if (clique > width + 1) {
    const message = `The problem contains ${groupDigits(clique)} variables that all interact with each other; by a proved bound the machine holds at most ${groupDigits(width + 1)} such: ${groupDigits(clique - width - 1)} too many.`
    return infeasibility('clique larger than the machine can hold', clique, width + 1, message)
  }
  const message = `The problem’s treewidth is at least ${groupDigits(lower)}, the machine’s at most ${groupDigits(width)}: ${groupDigits(lower - width)} too much.`
  return infeasibility('treewidth too large', lower, width, message)
}

/**
 * Treewidth never grows by contracting and deleting, so a problem whose lower bound is above the machine's upper bound
 * has no embedding.
 */
export function brokenTreewidth(task: EmbeddingTask, effort: Effort): Infeasibility | null {
  const { problem, family } = task
  if (family && treewidthReach(problem, effort) < DEFAULTS.worthwhileShare * familyTreewidth(family)) return null
  let width = Infinity
  let lower: number | null = null
  for (const bound of machineTreewidthBounds(task)) {
    width = Math.min(width, bound.width)
    lower ??= treewidthLowerBound(problem, { ...effort, enough: width })
    if (lower > width) return proofOf(problem, lower, width, effort.cliqueWork)
    if (task.segments && lower < DEFAULTS.improvement * width) return null
  }
  return null
}
