import { measureTag } from './paint-tags'
import type { TagLook, TextWidths } from './paint-tags'
import { spotsOf } from './labels'
import type { TagRequest, TagSpot } from './labels'
import type { Band } from './bands'
import type { ChainGeometry } from './geometry'
import type { Break } from './scene-types'
import type { Tier } from './tiers'

/** The longest bands of each chain, longest first: where its tag may sit. */
export function tagBands({ bands, neighbours }: ChainGeometry, most = 3): Band[][] {
  const ofChain: Band[][] = neighbours.map(() => [])
  for (const band of bands) ofChain[band.chain]!.push(band)
  const length = (band: Band) => Math.hypot(band.x2 - band.x1, band.y2 - band.y1)
  return ofChain.map((own) => [...own].sort((a, b) => length(b) - length(a)).slice(0, most))
}

const RATE_SPOTS: readonly [number, number][] = [
  [1.5, 0],
  [-1.5, 0],
  [0, 2.2],
  [0, -2.2],
  [1.3, 1.6],
  [-1.3, -1.6],
]

const PRIORITY: Record<Tier, number> = { focus: 1000, near: 500, full: 200, far: 0 }

export interface TagInput {
  readonly labels: readonly string[]
  readonly bands: readonly (readonly Band[])[]
  readonly tiers: readonly Tier[]
  readonly hueOf: (chain: number) => string
  /** Couplers whose rates are to be written. */
  readonly breaks: readonly Break[]
  readonly showsLabels: boolean
  readonly hovered: number | null
}

/**
 * Tags to be placed: the chain in focus first, then rates of breaks, then chains by length. Chains out of focus carry
 * none unless the pointer is on them, so that the bands stay in sight.
 */
export function requestTags(
  ctx: CanvasRenderingContext2D,
  input: TagInput,
  widths: TextWidths,
): { requests: TagRequest[]; looks: TagLook[] } {
  const requests: TagRequest[] = []
  const looks: TagLook[] = []
  const add = (look: TagLook, priority: number, spots: readonly TagSpot[], insist: boolean) => {
    requests.push({ key: looks.length, priority, spots, insist, ...measureTag(ctx, look, widths) })
    looks.push(look)
  }
  input.labels.forEach((text, chain) => {
    const tier = input.tiers[chain]!
    const isHovered = chain === input.hovered
    if ((tier === 'far' || !input.showsLabels) && !isHovered && tier !== 'focus') return
    const kind = tier === 'focus' ? 'focus' : 'chain'
    const bands = input.bands[chain]!
    const length = bands[0] ? Math.hypot(bands[0].x2 - bands[0].x1, bands[0].y2 - bands[0].y1) : 0
    const priority = PRIORITY[tier] + Math.min(99, length) + (isHovered ? 900 : 0)
    add({ text, kind, frame: input.hueOf(chain) }, priority, bands.flatMap(spotsOf), tier === 'focus' || isHovered)
  })
  for (const { rate, x, y } of input.breaks) {
    const spots = RATE_SPOTS.map(([ox, oy]) => ({ x, y, ox, oy, room: Infinity }))
    add({ text: rateText(rate), kind: 'rate', frame: '' }, 600 + rate, spots, true)
  }
  return { requests, looks }
}

/** `14 %`, or with one decimal under ten. */
export const rateText = (rate: number): string => `${rate < 0.0995 ? (100 * rate).toFixed(1) : Math.round(100 * rate)}%`
