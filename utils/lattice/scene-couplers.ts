import type { Band, Joint } from './bands'
import { SCENE_DEFAULTS } from './scene-types'
import type { Break, Draft, SceneInput } from './scene-types'
import type { Span } from './spans'
import { edgeFrom, middleOf } from './strokes'
import { colourOf, isInPart, TIER_LEVEL, widthOf } from './tiers'
import type { Tier } from './tiers'
import type { LatticeData, ReadLayer } from './types'

/** Couplers inside chains: squares where a chain crosses itself, bridges between two of its lines. */
export function addJoints(input: SceneInput, tiers: readonly Tier[], { edges, nodes }: Draft): void {
  const { tokens, lens, geometry, hues } = input
  for (const joint of geometry.joints) {
    if (!isInPart(input, joint.chain)) continue
    const tier = tiers[joint.chain]!
    const firm = tier === 'focus' || lens === 'load' ? tokens.ink : tokens.edge
    const color = lens === 'occupancy' ? colourOf(input, joint.chain, tier) : tier === 'far' ? tokens.rule : firm
    const z = TIER_LEVEL[tier] + 3
    if (joint.kind === 'crossing') {
      const isFocus = tier === 'focus' && lens === 'occupancy'
      const size = lens === 'occupancy' ? 0.68 * (tier === 'focus' ? 1.15 : widthOf(tier)) : 0.4
      const rim = isFocus ? tokens.paper : color
      nodes.push({ ...middleOf(joint), shape: 'square', size, color, rim, rimWidth: isFocus ? 1 : 0, halo: 0 })
    } else if (joint.kind === 'bridge') {
      const size = lens === 'occupancy' ? 0.8 * Math.min(1, widthOf(tier)) : SCENE_DEFAULTS.heldWidth * 0.8
      const inlay = lens === 'occupancy' && tier !== 'far' ? hues.inlay[joint.chain]! % 2 : 0
      edges.push(edgeFrom(joint, lens === 'occupancy' ? 'band' : 'line', { size, color, inlay, z }))
    } else if (lens === 'load' && tier !== 'far') {
      edges.push(edgeFrom(joint, 'line', { size: 0.35, color, z, caps: 0 }))
    }
  }
}

/** Rings on the chain in focus at every coupler that carries an interaction. */
export function addRings({ data, geometry, tokens, focused }: SceneInput, { nodes }: Draft): void {
  if (focused === null) return
  for (const coupler of geometry.roles.interactionCouplers) {
    const end: number = geometry.roles.owner[data.ends[2 * coupler]!] === focused ? 0 : 1
    if (geometry.roles.owner[data.ends[2 * coupler + end]!] !== focused) continue
    const at = 4 * coupler + 2 * end
    const place = { x: data.places[at]!, y: data.places[at + 1]!, chain: focused }
    nodes.push({ ...place, shape: 'circle', size: 0.43, color: tokens.paper, rim: tokens.ink, rimWidth: 1.3, halo: 0 })
  }
}

/** One read: a triangle for the spin of every qubit. */
export function addGlyphs(input: SceneInput, read: ReadLayer, tiers: readonly Tier[], { nodes }: Draft): void {
  const { geometry, tokens } = input
  for (const span of geometry.spans) {
    const spin = read.spins[span.qubit]
    if (!spin || !isInPart(input, span.chain)) continue
    const rim = tiers[span.chain] === 'far' ? tokens.edge : tokens.ink
    const color = spin > 0 ? rim : tokens.paper
    nodes.push({ ...middleOf(span), shape: spin > 0 ? 'up' : 'down', size: 0.88, color, rim, rimWidth: 1.2, halo: 1 })
  }
}

/** Couplers that disagreed: a dashed elbow along both qubits, wider the oftener. */
export function addBreaks(input: SceneInput, isOfPoints: boolean, { edges, breaks }: Draft): void {
  const { data, geometry, tokens } = input
  const spanOf = new Map<number, Band | Span>(geometry.spans.map((span) => [span.qubit, span]))
  for (const { joint, rate } of brokenJoints(input)) {
    if (!isInPart(input, joint.chain)) continue
    const size = SCENE_DEFAULTS.heldWidth + 0.75 * Math.sqrt(rate)
    const look = { size, color: tokens.clay, casing: 1, caps: 0, z: 40 }
    for (let end = 0; end < 2 && !isOfPoints; end++) {
      const x = end === 0 ? joint.x1 : joint.x2
      const y = end === 0 ? joint.y1 : joint.y2
      const arm = armAlong(spanOf.get(data.ends[2 * joint.coupler + end]!)!, x, y)
      edges.push(edgeFrom({ ...arm, chain: joint.chain }, 'dash', look))
    }
    if (Math.hypot(joint.x2 - joint.x1, joint.y2 - joint.y1) > 1e-3) edges.push(edgeFrom(joint, 'dash', look))
    breaks.push(breakAt(joint, rate))
  }
}

/** Couplers that are drawn as broken, for their tags. */
export const breaksOf = (input: RateInput): Break[] =>
  brokenJoints(input).map(({ joint, rate }) => breakAt(joint, rate))

const breakAt = (joint: Joint, rate: number): Break => ({ ...middleOf(joint), coupler: joint.coupler, rate })

function brokenJoints(input: RateInput): { joint: Joint; rate: number }[] {
  if (!input.breaks && !input.read) return []
  return input.geometry.joints.flatMap((joint) => {
    const rate = rateOf(input, joint)
    return rate === null ? [] : [{ joint, rate }]
  })
}

type RateInput = Pick<SceneInput, 'data' | 'geometry' | 'breaks' | 'read'>

/** Share of reads in which the joint's coupler disagreed, 1 or nothing for a single read; null when not drawn. */
function rateOf({ data, breaks, read }: RateInput, { coupler }: Joint): number | null {
  if (read) return isSplit(data, read, coupler) ? 1 : null
  if (!breaks) return null
  const rate =
    breaks.couplerRate instanceof Float64Array ? breaks.couplerRate[coupler] : breaks.couplerRate.get(coupler)
  return rate !== undefined && rate >= SCENE_DEFAULTS.leastBreak ? rate : null
}

const isSplit = ({ ends }: LatticeData, { spins }: ReadLayer, coupler: number): boolean =>
  spins[ends[2 * coupler]!]! * spins[ends[2 * coupler + 1]!]! < 0

/** From the coupler along its qubit, towards the longer side of what the qubit needs. */
function armAlong(span: Pick<Span, 'x1' | 'y1' | 'x2' | 'y2'>, x: number, y: number) {
  const toFirst = Math.hypot(span.x1 - x, span.y1 - y)
  const toSecond = Math.hypot(span.x2 - x, span.y2 - y)
  const [tx, ty, reach] = toFirst > toSecond ? [span.x1, span.y1, toFirst] : [span.x2, span.y2, toSecond]
  const share = reach === 0 ? 0 : Math.min(1, SCENE_DEFAULTS.breakArm / reach)
  return { x1: x, y1: y, x2: x + share * (tx - x), y2: y + share * (ty - y) }
}
