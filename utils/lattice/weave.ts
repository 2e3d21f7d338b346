import { passesOver } from './crossings'
import type { Crossing } from './crossings'
import type { Stroke } from './strokes'
import type { Tier } from './tiers'

/**
 * Upright strokes are drawn over level ones. Where over and under alternate the other way, the upright one leaves the
 * crossing out; only among strokes that matter alike, so that the focus lies over all.
 *
 * @returns for each upright stroke that passes under others, the lines on which it does
 */
export function gapsOf(
  strokes: readonly Stroke[],
  crossings: readonly Crossing[],
  tiers: readonly Tier[],
): Map<number, number[]> {
  const gaps = new Map<number, number[]>()
  for (const crossing of crossings) {
    const tier = tiers[strokes[crossing.horizontal]!.chain]!
    if (tier === 'far' || tier !== tiers[strokes[crossing.vertical]!.chain] || !passesOver(crossing)) continue
    const own = gaps.get(crossing.vertical)
    if (own) own.push(crossing.y)
    else gaps.set(crossing.vertical, [crossing.y])
  }
  for (const own of gaps.values()) own.sort((a, b) => a - b)
  return gaps
}
