import type { TracePoint } from '../../../shared/schemas/embeddings'

const DEFAULTS = { mostPoints: 120, spacingSeconds: 0.1 }

/** The course of a search, thinned evenly as it grows: with every halving the points lie twice as far apart. */
export class Trace {
  private points: TracePoint[] = []
  private newest: TracePoint | null = null
  private spacing = DEFAULTS.spacingSeconds

  add(point: TracePoint): void {
    this.newest = point
    const last = this.points.at(-1)
    if (last && point.seconds - last.seconds < this.spacing) return
    this.points.push(point)
    if (this.points.length < DEFAULTS.mostPoints) return
    this.points = this.points.filter((_, k) => k % 2 === 0)
    this.spacing *= 2
  }

  /** From the first to the newest, at most 120. */
  all(): TracePoint[] {
    return this.newest && this.newest !== this.points.at(-1) ? [...this.points, this.newest] : [...this.points]
  }
}
