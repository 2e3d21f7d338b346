import type { ChainGeometry } from './geometry'
import type { Overlay } from './paint-overlay'
import { placesOfPair } from './places'
import { breaksOf } from './scene-couplers'
import type { StageLook, StageSource } from './stage-types'
import type { Note, TagInput } from './tag-requests'
import { tiersOf } from './tiers'
import type { LatticeData, OverlayLayer } from './types'

/** What the tags of a lens, a focus and a filter say. */
export function tagInputOf(
  { data, geometry, hues, chains }: StageSource,
  look: StageLook,
  bands: TagInput['bands'],
): TagInput {
  const { tokens, lens, hiddenKinds, hovered } = look
  return {
    labels: chains.labels,
    bands,
    tiers: tiersOf({ geometry, ...look }),
    hueOf: (chain) => (lens === 'occupancy' ? tokens.hues[hues.hue[chain]!]! : tokens.edge),
    notes: [...rateNotes(data, geometry, look), ...markNotes(data, look)],
    showsLabels: !hiddenKinds?.has('labels'),
    hovered,
  }
}

/** Rates of the couplers that disagreed; a single read has none. */
function rateNotes(data: LatticeData, geometry: ChainGeometry, look: StageLook): Note[] {
  if (look.lens !== 'breaks' || look.read || look.hiddenKinds?.has('breaks')) return []
  return breaksOf({ data, geometry, breaks: look.breaks }).map(({ rate, x, y }) => ({
    text: rateText(rate),
    x,
    y,
    weight: rate,
    ink: look.tokens.claytext,
    clear: 0,
  }))
}

/** Numbers of the qubits pointed out, unless they are so many that they would be all one sees. */
function markNotes({ ids, segments }: LatticeData, { marks, hiddenKinds, tokens }: StageLook): Note[] {
  if (!marks) return []
  const inked = (qubits: Iterable<number> | undefined, ink: string) =>
    Array.from(qubits ?? [], (qubit) => ({ qubit, ink }))
  const lost = hiddenKinds?.has('marks') ? [] : inked(marks.qubits, tokens.claytext)
  const regained = hiddenKinds?.has('regained') ? [] : inked(marks.regained?.qubits, tokens.leaf)
  if (lost.length + regained.length > MOST_MARKS_NUMBERED) return []
  return [...lost, ...regained].map(({ qubit, ink }) => ({
    text: String(ids[qubit]),
    x: (segments[4 * qubit]! + segments[4 * qubit + 2]!) / 2,
    y: (segments[4 * qubit + 1]! + segments[4 * qubit + 3]!) / 2,
    weight: 0,
    ink,
    clear: MARK_PIXELS,
  }))
}

const MOST_MARKS_NUMBERED = 24
/** From the middle of a mark to beyond its rim where it is drawn largest. */
const MARK_PIXELS = 9

/** `14 %`, or with one decimal under ten. */
export const rateText = (rate: number): string => `${rate < 0.0995 ? (100 * rate).toFixed(1) : Math.round(100 * rate)}%`

/** What is pointed out, with where it lies. */
export function overlayOf({ data, geometry }: StageSource, layer: OverlayLayer): Overlay {
  return {
    data,
    layer,
    spanOf: new Map(geometry.spans.map((span) => [span.qubit, span])),
    placeOf: (a, b) => placesOfPair(data.segments, a, b),
  }
}
