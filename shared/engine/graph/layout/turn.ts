import type { Graph } from '../graph'
import { equalisedSites, rankingOf } from './sites'
import type { Layout, Sites } from './sites'

export const TURN_DEFAULTS = {
  /** Angles that are tried over a quarter turn. */
  angles: 24,
  /** Halvings of the angle's step around the best of them. */
  halvings: 12,
} as const

/** A drawing turned by the angle of least wirelength, and the sites that it then takes. */
export interface Turned {
  readonly layout: Layout
  readonly sites: Sites
  readonly length: number
}

function turned({ x, y }: Layout, angle: number): Layout {
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)]
  return {
    x: x.map((value, v) => cosine * value - sine * y[v]!),
    y: x.map((value, v) => sine * value + cosine * y[v]!),
  }
}

/**
 * Turns a drawing so that its wirelength after rank equalisation on columns × rows sites is least: the best of some
 * angles over a quarter turn, refined by halving steps.
 */
export function bestTurn(graph: Graph, layout: Layout, columns: number, rows: number, options = TURN_DEFAULTS): Turned {
  const ranking = rankingOf(graph.order)
  const at = (angle: number): Turned => {
    const drawing = turned(layout, angle)
    return { layout: drawing, ...equalisedSites(graph, drawing.x, drawing.y, columns, rows, ranking) }
  }
  let step = Math.PI / 2 / options.angles
  let angle = 0
  let best = at(angle)
  const consider = (candidate: number): void => {
    const result = at(candidate)
    if (result.length >= best.length) return
    best = result
    angle = candidate
  }
  for (let k = 1; k < options.angles; k++) consider(k * step)
  for (let k = 0; k < options.halvings; k++) {
    step /= 2
    const centre = angle
    consider(centre - step)
    consider(centre + step)
  }
  return best
}
