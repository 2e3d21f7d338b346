import type { Partner } from './graph'

/** Unit vectors of the arrow keys; y grows downwards, as on the screen. */
export const DIRECTIONS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
}

/** Widest angle, to either side of the arrow, in which a partner is looked for. */
const WIDEST = Math.PI / 3

/**
 * The partner that an arrow key leads to: of those lying that way the best in distance and angle together; null where
 * none does.
 *
 * @param positions x and y of each variable
 */
export function partnerTowards(
  positions: ArrayLike<number>,
  from: number,
  partners: readonly Partner[],
  [dx, dy]: readonly [number, number],
): number | null {
  let best: number | null = null
  let least = Infinity
  for (const { variable } of partners) {
    const x = positions[2 * variable]! - positions[2 * from]!
    const y = positions[2 * variable + 1]! - positions[2 * from + 1]!
    const distance = Math.hypot(x, y)
    const angle = distance > 0 ? Math.acos(Math.max(-1, Math.min(1, (x * dx + y * dy) / distance))) : 0
    if (angle > WIDEST + 1e-9) continue
    const cost = distance * (1 + 2 * angle)
    if (cost < least) {
      least = cost
      best = variable
    }
  }
  return best
}

/** The variable whose mark lies nearest to a point, within a distance; −1 where none does. */
export function nearestVariable(positions: ArrayLike<number>, x: number, y: number, within: number): number {
  let found = -1
  let least = within
  for (let i = 0; 2 * i < positions.length; i++) {
    const distance = Math.hypot(positions[2 * i]! - x, positions[2 * i + 1]! - y)
    if (distance <= least) {
      least = distance
      found = i
    }
  }
  return found
}
