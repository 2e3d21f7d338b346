import { SCENE_DEFAULTS } from './scene-types'
import type { SceneInput } from './scene-types'

/** How much a chain matters: all alike, or one in focus, those that interact with it, and the rest. */
export type Tier = 'full' | 'focus' | 'near' | 'far'

export const TIER_LEVEL: Record<Tier, number> = { far: 0, full: 10, near: 10, focus: 20 }

export type TierInput = Pick<SceneInput, 'geometry' | 'focused' | 'selected' | 'muted'>

/**
 * With a chain in focus: it, what interacts with it or is selected, and the rest. Without one: what is selected and the
 * rest, or all alike. Muted chains step back unless they are in focus.
 */
export function tiersOf({ geometry: { neighbours }, focused, selected, muted }: TierInput): Tier[] {
  const isFocusKnown = focused !== null && neighbours[focused] !== undefined
  const near = isFocusKnown ? new Set([...neighbours[focused]!, ...(selected ?? [])]) : (selected ?? new Set<number>())
  return neighbours.map((_, chain) => {
    if (isFocusKnown && chain === focused) return 'focus'
    if (muted?.has(chain)) return 'far'
    if (isFocusKnown) return near.has(chain) ? 'near' : 'far'
    return near.size === 0 || near.has(chain) ? 'full' : 'far'
  })
}

export const widthOf = (tier: Tier): number =>
  tier === 'focus'
    ? SCENE_DEFAULTS.focusWidth
    : tier === 'near'
      ? SCENE_DEFAULTS.nearWidth
      : tier === 'far'
        ? SCENE_DEFAULTS.farWidth
        : 1

/** Hue of a chain in the occupancy lens; chains out of focus lose theirs. */
export const colourOf = ({ tokens, hues }: Pick<SceneInput, 'tokens' | 'hues'>, chain: number, tier: Tier): string =>
  tier === 'far' ? tokens.rule : tokens.hues[hues.hue[chain]!]!

/** Whether this part of the scene draws the chain. */
export const isInPart = ({ part, focused }: Pick<SceneInput, 'part' | 'focused'>, chain: number): boolean =>
  part === undefined || (chain === focused) === (part === 'focus')
