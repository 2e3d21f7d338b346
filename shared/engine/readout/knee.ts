import type { Mean } from './mean'

/** The mean decoded energy at one chain strength, of the problem as minimised. */
export interface StrengthPoint extends Mean {
  readonly strength: number
}

export interface Knee {
  /** Place in the list given. */
  readonly index: number
  /** The point of lowest mean. */
  readonly best: number
  /**
   * weakest: the knee is the first point, weaker chains were not tried; strongest: the last point is the best and clearly
   * so, stronger chains may do better. Null: the knee lies within the scan.
   */
  readonly edge: 'weakest' | 'strongest' | null
}

/** Means farther apart than this many standard errors of their difference are taken to differ. */
const STANDARD_ERRORS = 2

/**
 * The knee of a scan over chain strengths: the weakest strength from which on, up to the best one, no mean energy lies
 * more than two standard errors above the lowest. Stronger chains than that cost scale, and gain nothing that the scan
 * can tell. The rule is ours.
 * @param points in order of rising strength, at least two
 * @returns null for fewer than two points
 */
export function kneeOf(points: readonly StrengthPoint[]): Knee | null {
  if (points.length < 2) return null
  let best = 0
  points.forEach(({ mean }, k) => {
    if (mean < points[best]!.mean) best = k
  })
  const lowest = points[best]!
  const asGood = ({ mean, standardError }: StrengthPoint): boolean =>
    mean - lowest.mean <= STANDARD_ERRORS * Math.hypot(standardError, lowest.standardError)
  let index = best
  while (index > 0 && asGood(points[index - 1]!)) index--
  const edge = index === 0 ? 'weakest' : index === points.length - 1 ? 'strongest' : null
  return { index, best, edge }
}
