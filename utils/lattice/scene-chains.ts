import { INLAYS } from '~/utils/hues'
import { crossingsOf } from './crossings'
import { HATCH, SCENE_DEFAULTS } from './scene-types'
import type { Draft, EdgeKind, SceneInput } from './scene-types'
import type { Span } from './spans'
import { ascending, edgeFrom, isUpright, middleOf } from './strokes'
import type { EdgeLook, Stroke } from './strokes'
import { colourOf, isInPart, TIER_LEVEL, widthOf } from './tiers'
import type { Tier } from './tiers'
import { mixColours } from './tokens'
import type { Tokens } from './tokens'
import type { LoadLayer } from './types'
import { gapsOf } from './weave'

/** Cornflower and lichen are so light in the dark theme that their bands look broader than others of the same width. */
const LOUD_IN_DARK: ReadonlySet<number> = new Set([2, 4])

const isOutlined = ({ focused, selected }: SceneInput, chain: number): boolean =>
  chain === focused || selected?.has(chain) === true

const DOTS = INLAYS.indexOf('dots')

/** The chain in focus has no dots, which would pass for the rings of its couplers. */
const inlayOf = (inlay: number, tier: Tier): number =>
  tier === 'far' || (tier === 'focus' && inlay === DOTS) ? 0 : inlay

/** Occupancy: a band in the hue of its chain for every straight piece of it. */
export function addBands(input: SceneInput, tiers: readonly Tier[], { edges }: Draft): void {
  const { geometry, hues, tokens } = input
  const gaps = gapsOf(geometry.bands, geometry.crossings, tiers)
  geometry.bands.forEach((band, i) => {
    const { chain } = band
    if (!isInPart(input, chain)) return
    const tier = tiers[chain]!
    const outline = isOutlined(input, chain) ? 1 : 0
    const look: EdgeLook = {
      // What is selected beside the focus is outlined, and needs the room for it.
      size:
        Math.max(widthOf(tier), outline > 0 ? 1 : 0) * (tokens.isDark && LOUD_IN_DARK.has(hues.hue[chain]!) ? 0.88 : 1),
      color: colourOf(input, chain, tier),
      inlay: inlayOf(hues.inlay[chain]!, tier),
      casing: tier === 'far' ? 0 : 1,
      outline,
      z: TIER_LEVEL[tier] + (isUpright(band) ? 1 : 0),
      gaps: gaps.get(i) ?? [],
    }
    edges.push(edgeFrom(ascending(band), 'band', look))
  })
}

/** Load: a tube for every qubit, filled from its lower end. */
export function addTubes(input: SceneInput, load: LoadLayer, tiers: readonly Tier[], { edges }: Draft): void {
  const { geometry } = input
  const gaps = gapsOf(geometry.spans, crossingsOf(geometry.spans), tiers)
  const lookOf = tubeLooks(input, load, tiers)
  geometry.spans.forEach((span, i) => {
    if (!isInPart(input, span.chain)) return
    const kind: EdgeKind = tiers[span.chain] === 'far' ? 'line' : 'tube'
    edges.push(edgeFrom(ascending(span), kind, { ...lookOf(span), gaps: gaps.get(i) ?? [] }))
  })
}

/** Fillings by how much of the range is used; full ones are hatched as well. */
export const loadColours = (tokens: Pick<Tokens, 'paper' | 'slate' | 'ochre'>) => ({
  low: mixColours(tokens.slate, tokens.paper, 0.45),
  high: tokens.slate,
  full: tokens.ochre,
})

function tubeLooks(input: SceneInput, { qubitLoad }: LoadLayer, tiers: readonly Tier[]): (span: Span) => EdgeLook {
  const { tokens } = input
  const { fullLoad, highLoad } = SCENE_DEFAULTS
  const colours = loadColours(tokens)
  return (span) => {
    const tier = tiers[span.chain]!
    const share = qubitLoad[span.qubit]!
    const isFull = share > fullLoad
    const from = isUpright(span) ? Math.min(span.y1, span.y2) : Math.min(span.x1, span.x2)
    const filling = isFull ? colours.full : share > highLoad ? colours.high : colours.low
    return {
      size: tier === 'focus' ? 1.5 : tier === 'far' ? widthOf(tier) : 0.96,
      color: tier === 'far' ? tokens.rule : filling,
      value: from + Math.min(1, share) * Math.hypot(span.x2 - span.x1, span.y2 - span.y1),
      inlay: isFull ? HATCH : 0,
      casing: 1,
      outline: isOutlined(input, span.chain) ? 1 : 0,
      caps: 0,
      z: TIER_LEVEL[tier] + (isUpright(span) ? 1 : 0),
    }
  }
}

/** Breaks: chains that held, as thin grey lines; the one in focus hollow. */
export function addHeldChains(input: SceneInput, tiers: readonly Tier[], { edges }: Draft): void {
  const { tokens, geometry } = input
  for (const band of geometry.bands) {
    if (!isInPart(input, band.chain)) continue
    const tier = tiers[band.chain]!
    const z = TIER_LEVEL[tier] + (isUpright(band) ? 1 : 0)
    const hollow = { size: tier === 'focus' ? 1.45 : 1, color: tokens.paper, z, casing: 1, outline: 1 }
    const held = { size: SCENE_DEFAULTS.heldWidth, color: tier === 'far' ? tokens.rule : tokens.edge, z }
    edges.push(isOutlined(input, band.chain) ? edgeFrom(band, 'band', hollow) : edgeFrom(band, 'line', held))
  }
}

/** Qubits without length: discs in the colour of their chain; in the load lens, rings filled from within. */
export function addDiscs(input: SceneInput, tiers: readonly Tier[], { nodes }: Draft): void {
  const { tokens, lens, load, geometry } = input
  const { discSize, fullLoad } = SCENE_DEFAULTS
  for (const span of geometry.spans) {
    if (!isInPart(input, span.chain)) continue
    const tier = tiers[span.chain]!
    const rim = tier === 'far' ? tokens.rule : tokens.ink
    const disc = { ...middleOf(span as Stroke), shape: 'circle' as const, size: discSize, rim, rimWidth: 0, halo: 1 }
    const outline = isOutlined(input, span.chain) ? 2 : 0
    if (lens === 'load' && load) {
      const share = load.qubitLoad[span.qubit]!
      nodes.push({ ...disc, color: tokens.paper, rimWidth: outline || 1 })
      const color = tier === 'far' ? tokens.rule : share > fullLoad ? tokens.ochre : tokens.slate
      nodes.push({ ...disc, color, size: discSize * Math.min(1, share), halo: 0 })
    } else {
      const grey = tier === 'far' ? tokens.rule : tokens.edge
      const color = lens === 'occupancy' ? colourOf(input, span.chain, tier) : grey
      nodes.push({ ...disc, color, rimWidth: outline })
    }
  }
}
