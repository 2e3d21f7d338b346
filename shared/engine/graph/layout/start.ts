import type { Random } from '../../random'
import { sizeOf } from '../graph'
import type { Graph } from '../graph'
import { pivotLayout } from './pivot'
import { equalisedSites } from './sites'
import type { Layout, Sites } from './sites'
import { spectralAxes } from './spectral'
import { bestTurn } from './turn'

export const START_DEFAULTS = {
  /** Below this share of a random placement's wirelength a graph counts as mesh-like: then turning pays. */
  meshShare: 0.25,
} as const

/** A drawing and what it becomes on the sites. */
export interface Start {
  readonly layout: Layout
  readonly sites: Sites
  readonly length: number
}

function onSites(graph: Graph, layout: Layout, columns: number, rows: number): Start {
  return { layout, ...equalisedSites(graph, layout.x, layout.y, columns, rows) }
}

const shorter = (a: Start, b: Start): Start => (b.length < a.length ? b : a)

/**
 * Draws a connected graph for placement on columns × rows sites: from distances to pivots, or from the lowest modes of
 * its Laplacian, whichever has the shorter wirelength; turned to the best angle where it is mesh-like.
 */
export function placementStart(graph: Graph, columns: number, rows: number, random: Random): Start {
  const pivot = onSites(graph, pivotLayout(graph, random), columns, rows)
  const axes = spectralAxes(graph, pivot.layout)
  if (!axes) return pivot
  const [first, ...others] = axes
  const drawings = others.map((y) => onSites(graph, { x: first!, y }, columns, rows))
  const longest = (sizeOf(graph) * (columns + rows)) / 3
  const best = drawings.reduce(shorter, pivot)
  if (best.length > START_DEFAULTS.meshShare * longest) return best
  return [pivot, ...drawings.slice(0, 1), best]
    .map(({ layout }) => bestTurn(graph, layout, columns, rows))
    .reduce(shorter, best)
}
