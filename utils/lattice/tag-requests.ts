import { measureTag } from './paint-tags'
import type { TagLook, TextWidths } from './paint-tags'
import { spotsOf } from './labels'
import type { TagRequest, TagSpot } from './labels'
import type { Band } from './bands'
import type { ChainGeometry } from './geometry'
import { boxOfSegments } from './segments'
import type { Tier } from './tiers'
import type { Box, View } from './types'

/** Where the tag of a chain may sit, and how far the chain reaches. */
export interface TagSeat {
  readonly spots: readonly TagSpot[]
  /** Around all bands of the chain. */
  readonly box: Box
  /** Length of the longest band, in line spacings. */
  readonly longest: number
}

const lengthOf = (band: Band) => Math.hypot(band.x2 - band.x1, band.y2 - band.y1)

/** The tag of a chain sits on one of its longest bands, or beside it. */
export function tagBands({ bands, neighbours }: ChainGeometry, most = 3): TagSeat[] {
  const ofChain: Band[][] = neighbours.map(() => [])
  for (const band of bands) ofChain[band.chain]!.push(band)
  return ofChain.map((own) => {
    const longest = [...own].sort((a, b) => lengthOf(b) - lengthOf(a)).slice(0, most)
    return {
      spots: longest.flatMap(spotsOf),
      box: boxOfSegments(Float32Array.from(own.flatMap(({ x1, y1, x2, y2 }) => [x1, y1, x2, y2]))) ?? NOWHERE,
      longest: longest[0] ? lengthOf(longest[0]) : 0,
    }
  })
}

const NOWHERE: Box = { x1: 0, y1: 0, x2: 0, y2: 0 }

/** Beside, below and above the place of a note, in units of half the tag's own size; its mark of some pixels stays free. */
function noteSpots({ clear }: Note, { width, height }: { width: number; height: number }): readonly [number, number][] {
  const beside = Math.max(1.5, 1 + (2 * clear) / width)
  const clearOf = 1 + (2 * clear) / height
  const below = Math.max(2.2, clearOf)
  const aslant = Math.max(1.6, clearOf)
  return [
    [beside, 0],
    [-beside, 0],
    [0, below],
    [0, -below],
    [1.3, aslant],
    [-1.3, -aslant],
  ]
}

const PRIORITY: Record<Tier, number> = { focus: 1000, near: 500, full: 200, far: 0 }

export interface Note {
  readonly text: string
  readonly x: number
  readonly y: number
  /** Those of more weight are placed first, 0 … 1. */
  readonly weight: number
  readonly ink: string
  /** Pixels around its place that its mark takes up. */
  readonly clear: number
}

export interface TagInput {
  readonly labels: readonly string[]
  readonly bands: readonly TagSeat[]
  readonly tiers: readonly Tier[]
  readonly hueOf: (chain: number) => string
  /** Rates of breaks, numbers of marked qubits: written beside their places. */
  readonly notes: readonly Note[]
  readonly showsLabels: boolean
  readonly hovered: number | null
}

/** The part of the lattice that tags are wanted for. */
export interface TagArea {
  readonly view: View
  /** In pixels. */
  readonly viewport: Box
}

export const REQUEST_DEFAULTS = {
  /** Share of its tag's width that a chain must extend over: the tags of smaller ones would be all that one sees. */
  leastExtent: 0.9,
  /** Line spacing in pixels from which every chain is large enough. */
  near: 9,
}

/**
 * Tags to be placed: the chain in focus first, then notes, then chains by length. Chains out of focus carry
 * none unless the pointer is on them, so that the bands stay in sight; nor do chains smaller than their tags.
 *
 * @param area leaves out what lies outside; everything is asked for without it
 */
export function requestTags(
  ctx: CanvasRenderingContext2D,
  input: TagInput,
  widths: TextWidths,
  area: TagArea | null = null,
): { requests: TagRequest[]; looks: TagLook[] } {
  const requests: TagRequest[] = []
  const looks: TagLook[] = []
  const add = (look: TagLook, request: Omit<TagRequest, 'key' | 'width' | 'height'>) => {
    requests.push({ key: looks.length, ...request, ...measureTag(ctx, look, widths) })
    looks.push(look)
  }
  input.labels.forEach((text, chain) => {
    const tier = input.tiers[chain]!
    const isHovered = chain === input.hovered
    const insist = tier === 'focus' || isHovered
    if (!insist && (tier === 'far' || !input.showsLabels)) return
    const { spots, box, longest } = input.bands[chain]!
    const look: TagLook = { text, kind: tier === 'focus' ? 'focus' : 'chain', frame: input.hueOf(chain) }
    if (area && !isWithin(area, box)) return
    if (area && !insist && isTooSmall(box, area.view.scale, measureTag(ctx, look, widths).width)) return
    add(look, { priority: PRIORITY[tier] + Math.min(99, longest) + (isHovered ? 900 : 0), spots, insist })
  })
  for (const note of input.notes) {
    const { text, x, y, weight, ink } = note
    if (area && !isWithin(area, { x1: x, y1: y, x2: x, y2: y })) continue
    const look: TagLook = { text, kind: 'note', frame: ink }
    const spots = noteSpots(note, measureTag(ctx, look, widths)).map(([ox, oy]) => ({ x, y, ox, oy, room: Infinity }))
    add(look, { priority: 600 + weight, spots, insist: true })
  }
  return { requests, looks }
}

const isTooSmall = ({ x1, y1, x2, y2 }: Box, scale: number, tag: number): boolean =>
  scale < REQUEST_DEFAULTS.near && Math.max(x2 - x1, y2 - y1) * scale < REQUEST_DEFAULTS.leastExtent * tag

const isWithin = ({ view: { scale, x, y }, viewport }: TagArea, box: Box): boolean =>
  x + scale * box.x2 >= viewport.x1 &&
  x + scale * box.x1 <= viewport.x2 &&
  y + scale * box.y2 >= viewport.y1 &&
  y + scale * box.y1 <= viewport.y2
