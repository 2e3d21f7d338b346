import { sizeOf } from '../graph'
import type { Graph } from '../graph'
import { equalisedSites, rankingOf } from './sites'
import type { Layout, Ranking, Sites } from './sites'

export const TURN_DEFAULTS = {
  /** Angles that are tried over a quarter turn. */
  angles: 24,
  /** Halvings of the angle's step around the best of them. */
  halvings: 8,
} as const

/** A drawing and the sites that it takes by rank equalisation. */
export interface Equalised {
  readonly layout: Layout
  readonly sites: Sites
  readonly length: number
}

export const shorter = (a: Equalised, b: Equalised): Equalised => (b.length < a.length ? b : a)

/** Equalises drawings of one graph on one grid. */
export class Equaliser {
  private readonly ranking: Ranking

  constructor(
    readonly graph: Graph,
    readonly columns: number,
    readonly rows: number,
  ) {
    this.ranking = rankingOf(graph.order)
  }

  /** The drawing, or with x and y swapped where the grid is not square and that is shorter, on its sites. */
  equalise(layout: Layout): Equalised {
    const upright = this.onSites(layout)
    return this.columns === this.rows ? upright : shorter(upright, this.onSites({ x: layout.y, y: layout.x }))
  }

  private onSites(layout: Layout): Equalised {
    return { layout, ...equalisedSites(this.graph, layout.x, layout.y, this.columns, this.rows, this.ranking) }
  }

  /** Whether all edges have length 1, so that nothing can be better. */
  isPerfect({ length }: Equalised): boolean {
    return length === sizeOf(this.graph)
  }
}

/** The drawing turned about the origin, in radians. */
export function turned({ x, y }: Layout, angle: number): Layout {
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)]
  return {
    x: x.map((value, v) => cosine * value - sine * y[v]!),
    y: x.map((value, v) => sine * value + cosine * y[v]!),
  }
}

/**
 * The two angles that make the turned axes statistically most independent, from the fourth moment of x + iy (Comon,
 * Independent component analysis, a new concept?, Signal Processing 36:287, 1994). A square grid's two lowest modes,
 * which have one eigenvalue and hence any direction, are so turned to its rows and columns.
 */
function independentAngles({ x, y }: Layout): [number, number] {
  let [real, imaginary] = [0, 0]
  for (let v = 0; v < x.length; v++) {
    const [a, b] = [x[v]!, y[v]!]
    real += a ** 4 - 6 * a * a * b * b + b ** 4
    imaginary += 4 * a * b * (a * a - b * b)
  }
  const phase = Math.atan2(imaginary, real)
  return [(Math.PI - phase) / 4, -phase / 4]
}

/** The drawing at the best of some angles over a quarter turn; the first that is perfect ends the search. */
export function bestTurn(equaliser: Equaliser, layout: Layout, { angles } = TURN_DEFAULTS): Equalised {
  let best = equaliser.equalise(layout)
  const regular = Array.from({ length: angles - 1 }, (_, k) => ((k + 1) * Math.PI) / 2 / angles)
  for (const angle of [...independentAngles(layout), ...regular]) {
    if (equaliser.isPerfect(best)) break
    best = shorter(best, equaliser.equalise(turned(layout, angle)))
  }
  return best
}

/** Turns the drawing to and fro by smaller and smaller angles as long as that makes it better. */
export function refineTurn(equaliser: Equaliser, start: Equalised, { angles, halvings } = TURN_DEFAULTS): Equalised {
  let best = start
  let step = Math.PI / 2 / angles
  for (let k = 0; k < halvings && !equaliser.isPerfect(best); k++) {
    step /= 2
    const { layout } = best
    best = shorter(best, equaliser.equalise(turned(layout, step)))
    best = shorter(best, equaliser.equalise(turned(layout, -step)))
  }
  return best
}
