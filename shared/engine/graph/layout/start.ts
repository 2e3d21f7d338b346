import type { Random } from '../../random'
import { sizeOf } from '../graph'
import type { Graph } from '../graph'
import { pivotLayout } from './pivot'
import { spectralLayouts } from './spectral'
import { Equaliser, bestTurn, refineTurn, shorter } from './turn'
import type { Equalised } from './turn'

export const START_DEFAULTS = {
  /** Below this share of a random placement's wirelength a graph counts as mesh-like, so that turning pays … */
  meshShare: 0.25,
  /** … and below this mean edge length, for on few sites a random placement is short too. */
  meshEdge: 2.5,
} as const

/** Whether a wirelength is as short as only mesh-like graphs have it. */
function isMeshLike(length: number, { graph, columns, rows }: Equaliser): boolean {
  const strewnEdge = (columns + rows) / 3
  return length <= sizeOf(graph) * Math.max(START_DEFAULTS.meshEdge, START_DEFAULTS.meshShare * strewnEdge)
}

/**
 * Draws a connected graph for placement on columns × rows sites: from distances to pivots, or from the lowest modes of
 * its Laplacian, whichever has the shorter wirelength; turned to the best angle where it is mesh-like.
 * @throws RangeError when the graph is not connected or has more vertices than there are sites
 */
export function placementStart(graph: Graph, columns: number, rows: number, random: Random): Equalised {
  const equaliser = new Equaliser(graph, columns, rows)
  const pivot = equaliser.equalise(pivotLayout(graph, random))
  const [lowest, ...others] = spectralLayouts(graph, pivot.layout).map((layout) => equaliser.equalise(layout))
  if (!lowest || equaliser.isPerfect(pivot)) return pivot
  const best = others.reduce(shorter, shorter(pivot, lowest))
  if (!isMeshLike(best.length, equaliser)) return best
  const turnedLowest = shorter(best, bestTurn(equaliser, lowest.layout))
  if (equaliser.isPerfect(turnedLowest)) return turnedLowest
  return refineTurn(equaliser, shorter(turnedLowest, bestTurn(equaliser, pivot.layout)))
}
