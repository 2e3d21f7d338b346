import type { Random } from '../../random'
import { sizeOf } from '../graph'
import type { Graph } from '../graph'
import { pivotLayout } from './pivot'
import { spectralLayouts } from './spectral'
import { Equaliser, bestTurn, refineTurn, shorter } from './turn'
import type { Equalised } from './turn'

export const START_DEFAULTS = {
  /** Below this share of a random placement's wirelength a graph counts as mesh-like, so that turning pays. */
  meshShare: 0.25,
} as const

/** Mean wirelength when vertices are strewn over the sites at random. */
const strewnLength = (graph: Graph, columns: number, rows: number): number => (sizeOf(graph) * (columns + rows)) / 3

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
  if (best.length > START_DEFAULTS.meshShare * strewnLength(graph, columns, rows)) return best
  const turnedLowest = shorter(best, bestTurn(equaliser, lowest.layout))
  if (equaliser.isPerfect(turnedLowest)) return turnedLowest
  return refineTurn(equaliser, shorter(turnedLowest, bestTurn(equaliser, pivot.layout)))
}
