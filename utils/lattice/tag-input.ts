import type { Overlay } from './paint-overlay'
import { placesOfPair } from './places'
import { breaksOf } from './scene-couplers'
import type { StageLook, StageSource } from './stage-types'
import type { TagInput } from './tag-requests'
import { tiersOf } from './tiers'
import type { OverlayLayer } from './types'

/** What the tags of a lens, a focus and a filter say. */
export function tagInputOf(
  { data, geometry, hues, chains }: StageSource,
  look: StageLook,
  bands: TagInput['bands'],
): TagInput {
  const { tokens, lens, hiddenKinds, hovered } = look
  const showsRates = lens === 'breaks' && !look.read && !hiddenKinds?.has('breaks')
  return {
    labels: chains.labels,
    bands,
    tiers: tiersOf({ geometry, ...look }),
    hueOf: (chain) => (lens === 'occupancy' ? tokens.hues[hues.hue[chain]!]! : tokens.edge),
    breaks: showsRates ? breaksOf({ data, geometry, breaks: look.breaks }) : [],
    showsLabels: !hiddenKinds?.has('labels'),
    hovered,
  }
}

/** What is pointed out, with where it lies. */
export function overlayOf({ data, geometry }: StageSource, layer: OverlayLayer): Overlay {
  return {
    data,
    layer,
    spanOf: new Map(geometry.spans.map((span) => [span.qubit, span])),
    placeOf: (a, b) => placesOfPair(data.segments, a, b),
  }
}
