import type { ChainHues } from '~/utils/hues'
import { crossingsOf, passesOver } from './crossings'
import { EDGE_KINDS, HATCH, UNDER_BITS } from './band-layer'
import type { EdgeKind } from './band-layer'
import type { Band, Joint } from './bands'
import type { ChainGeometry } from './geometry'
import type { Span } from './spans'
import { mixColours } from './tokens'
import type { Tokens } from './tokens'
import type { BreakLayer, LatticeData, Lens, LoadLayer, ReadLayer } from './types'

/** A mark of the drawing; sizes are in widths of a band. */
export interface SceneNode {
  readonly x: number
  readonly y: number
  readonly shape: 'circle' | 'square' | 'up' | 'down'
  readonly size: number
  readonly color: string
  readonly rim: string
  readonly rimWidth: number
  readonly halo: number
  readonly chain: number
}

/** A straight piece of the drawing; sizes are in widths of a band, `from` and `span` in line spacings. */
export interface SceneEdge {
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
  readonly kind: number
  readonly size: number
  readonly color: string
  readonly from: number
  readonly span: number
  readonly value: number
  readonly inlay: number
  readonly casing: number
  readonly outline: number
  readonly caps: number
  /** Bits of the lines on which the edge passes under others; see bandLayer. */
  readonly under0: number
  readonly under1: number
  readonly under2: number
  /** Order of drawing. */
  readonly z: number
  readonly chain: number
}

/** A coupler that disagreed, for its tag. */
export interface Break {
  readonly chain: number
  readonly coupler: number
  readonly rate: number
  readonly x: number
  readonly y: number
}

export interface Scene {
  readonly nodes: readonly SceneNode[]
  readonly edges: readonly SceneEdge[]
  readonly breaks: readonly Break[]
}

export interface SceneInput {
  readonly data: LatticeData
  readonly geometry: ChainGeometry
  readonly hues: ChainHues
  readonly tokens: Tokens
  readonly lens: Lens
  readonly focused: number | null
  readonly breaks?: BreakLayer | null
  readonly load?: LoadLayer | null
  readonly read?: ReadLayer | null
}

export const SCENE_DEFAULTS = {
  /** Width of chains that interact with the one in focus. */
  nearWidth: 0.72,
  farWidth: 0.62,
  focusWidth: 1.95,
  /** Width of the part of a qubit that no coupler needs. */
  tailWidth: 0.11,
  heldWidth: 0.5,
  /** Radius of a qubit in a lattice of points. */
  discSize: 0.72,
  /** Share of reads from which a disagreeing coupler is drawn. */
  leastBreak: 0.02,
  /** Share of the range from which a load is hatched. */
  fullLoad: 0.9,
  /** Share up to which a tube is filled in a paler slate, so that the fuller ones stand out where many lie together. */
  highLoad: 0.7,
  /** Length of each arm of a break. */
  breakArm: 2.2,
}

/** How much a chain matters while another is in focus. */
export type Tier = 'full' | 'focus' | 'near' | 'far'

const TIER_LEVEL: Record<Tier, number> = { far: 0, full: 10, near: 10, focus: 20 }

export function tiersOf({ geometry, focused }: Pick<SceneInput, 'geometry' | 'focused'>): Tier[] {
  if (focused === null || !geometry.neighbours[focused]) return geometry.neighbours.map(() => 'full')
  const near = new Set(geometry.neighbours[focused])
  return geometry.neighbours.map((_, i) => (i === focused ? 'focus' : near.has(i) ? 'near' : 'far'))
}

/** All that sigma draws for one lens and one focus. */
export function buildScene(input: SceneInput): Scene {
  const tiers = tiersOf(input)
  const edges: SceneEdge[] = []
  const nodes: SceneNode[] = []
  const breaks: Break[] = []
  if (isOfPoints(input)) addDiscs(input, tiers, nodes)
  else if (input.lens === 'load' && input.load) addTubes(input, input.load, tiers, edges)
  else if (input.lens === 'breaks') addHeldChains(input, tiers, edges)
  else addBands(input, tiers, edges)
  addJoints(input, tiers, edges, nodes)
  if (input.lens === 'breaks') {
    if (input.read) addGlyphs(input, input.read, nodes)
    addBreaks(input, edges, breaks)
  }
  if (input.lens !== 'breaks') addRings(input, nodes)
  return { nodes, edges, breaks }
}

const widthOf = (tier: Tier): number =>
  tier === 'focus'
    ? SCENE_DEFAULTS.focusWidth
    : tier === 'near'
      ? SCENE_DEFAULTS.nearWidth
      : tier === 'far'
        ? SCENE_DEFAULTS.farWidth
        : 1

/** Cornflower and lichen are so light in the dark theme that their bands look broader than others of the same width. */
const LOUD_IN_DARK: ReadonlySet<number> = new Set([2, 4])

/** Hue of a chain in the occupancy lens; chains out of focus lose theirs. */
const colourOf = ({ tokens, hues }: Pick<SceneInput, 'tokens' | 'hues'>, chain: number, tier: Tier): string =>
  tier === 'far' ? tokens.rule : tokens.hues[hues.hue[chain]!]!

interface Stroke {
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
  readonly chain: number
}

function edgeFrom(
  stroke: Stroke,
  kind: EdgeKind,
  look: Partial<SceneEdge> & { size: number; color: string; z: number },
): SceneEdge {
  const { x1, y1, x2, y2, chain } = stroke
  return {
    x1,
    y1,
    x2,
    y2,
    chain,
    kind: EDGE_KINDS[kind],
    from: Math.abs(x2 - x1) >= Math.abs(y2 - y1) ? x1 : y1,
    span: Math.hypot(x2 - x1, y2 - y1),
    value: 0,
    inlay: 0,
    casing: 0,
    outline: 0,
    caps: 1,
    under0: 0,
    under1: 0,
    under2: 0,
    ...look,
  }
}

const isUpright = (stroke: Stroke) => Math.abs(stroke.x2 - stroke.x1) < Math.abs(stroke.y2 - stroke.y1)

/** Whether the machine is a lattice of points: its qubits have no length, and chains run along couplers. */
const isOfPoints = ({ data: { segments } }: SceneInput): boolean =>
  segments[0] === segments[2] && segments[1] === segments[3]

/** Qubits without length: discs in the colour of their chain; in the load lens, rings filled from within. */
function addDiscs(input: SceneInput, tiers: readonly Tier[], nodes: SceneNode[]): void {
  const { tokens, lens, load, geometry } = input
  const { discSize, fullLoad } = SCENE_DEFAULTS
  for (const span of geometry.spans) {
    const tier = tiers[span.chain]!
    const rim = tier === 'far' ? tokens.rule : tokens.ink
    const disc = { ...mark(span), shape: 'circle' as const, size: discSize, rim, rimWidth: 0, halo: 1 }
    const isFocus = tier === 'focus'
    if (lens === 'load' && load) {
      const share = load.qubitLoad[span.qubit]!
      nodes.push({ ...disc, color: tokens.paper, rimWidth: isFocus ? 2 : 1 })
      const color = tier === 'far' ? tokens.rule : share > fullLoad ? tokens.ochre : tokens.slate
      nodes.push({ ...disc, color, size: discSize * Math.min(1, share), halo: 0 })
    } else {
      const grey = tier === 'far' ? tokens.rule : tokens.edge
      const color = lens === 'occupancy' ? colourOf(input, span.chain, tier) : grey
      nodes.push({ ...disc, color, rimWidth: isFocus ? 2 : 0 })
    }
  }
}

/** Whole qubits of chains, as thin lines beneath the bands, grouped by colour; those out of focus come first. */
export interface Tails {
  readonly color: string
  readonly qubits: readonly number[]
}

export function tailsOf(input: Pick<SceneInput, 'geometry' | 'focused' | 'hues' | 'tokens' | 'lens'>): Tails[] {
  const tiers = tiersOf(input)
  const groups = new Map<string, number[]>([[input.tokens.rule, []]])
  for (const { qubit, chain } of input.geometry.spans) {
    const tier = tiers[chain]!
    const grey = tier === 'far' ? input.tokens.rule : input.tokens.edge
    const color = input.lens === 'occupancy' ? colourOf(input, chain, tier) : grey
    const group = groups.get(color)
    if (group) group.push(qubit)
    else groups.set(color, [qubit])
  }
  return [...groups].map(([color, qubits]) => ({ color, qubits }))
}

function addBands(input: SceneInput, tiers: readonly Tier[], edges: SceneEdge[]): void {
  const { geometry, hues } = input
  const look = (stroke: Stroke, lift: number) => {
    const tier = tiers[stroke.chain]!
    return {
      size: widthOf(tier) * (input.tokens.isDark && LOUD_IN_DARK.has(hues.hue[stroke.chain]!) ? 0.88 : 1),
      color: colourOf(input, stroke.chain, tier),
      inlay: tier === 'far' ? 0 : hues.inlay[stroke.chain]!,
      casing: tier === 'far' ? 0 : 1,
      outline: tier === 'focus' ? 1 : 0,
      z: TIER_LEVEL[tier] + lift,
    }
  }
  const under = underBits(geometry.bands, geometry.crossings, tiers)
  geometry.bands.forEach((band, i) =>
    edges.push(edgeFrom(ascending(band), 'band', { ...look(band, isUpright(band) ? 1 : 0), ...under.get(i) })),
  )
}

type UnderBits = Pick<SceneEdge, 'under0' | 'under1' | 'under2'>

/**
 * Upright strokes are drawn over level ones. Where over and under alternate the other way, bits tell the upright one to
 * leave the crossing out; only among strokes that matter alike, so that the focus lies over all.
 */
function underBits(
  strokes: readonly Stroke[],
  crossings: ChainGeometry['crossings'],
  tiers: readonly Tier[],
): Map<number, UnderBits> {
  const under = new Map<number, [number, number, number]>()
  for (const crossing of crossings) {
    const tier = tiers[strokes[crossing.horizontal]!.chain]!
    const upright = strokes[crossing.vertical]!
    if (tier === 'far' || tier !== tiers[upright.chain] || !passesOver(crossing)) continue
    const line = Math.round(crossing.y)
    const k = line - Math.ceil(Math.min(upright.y1, upright.y2) - 1e-3)
    if (Math.abs(crossing.y - line) > 1e-3 || k >= 3 * UNDER_BITS) continue
    const bits = under.get(crossing.vertical) ?? [0, 0, 0]
    bits[Math.floor(k / UNDER_BITS)]! += 2 ** (k % UNDER_BITS)
    under.set(crossing.vertical, bits)
  }
  return new Map([...under].map(([i, [under0, under1, under2]]) => [i, { under0, under1, under2 }]))
}

function addTubes(input: SceneInput, load: LoadLayer, tiers: readonly Tier[], edges: SceneEdge[]): void {
  const { geometry, tokens } = input
  const quietSlate = mixColours(tokens.slate, tokens.paper, 0.45)
  const look = (span: Span, lift: number): Partial<SceneEdge> & { size: number; color: string; z: number } => {
    const tier = tiers[span.chain]!
    const share = load.qubitLoad[span.qubit]!
    const isFull = share > SCENE_DEFAULTS.fullLoad
    const from = isUpright(span) ? Math.min(span.y1, span.y2) : Math.min(span.x1, span.x2)
    return {
      size: tier === 'focus' ? 1.5 : tier === 'far' ? widthOf(tier) : 0.96,
      color:
        tier === 'far'
          ? tokens.rule
          : isFull
            ? tokens.ochre
            : share > SCENE_DEFAULTS.highLoad
              ? tokens.slate
              : quietSlate,
      value: from + share * Math.hypot(span.x2 - span.x1, span.y2 - span.y1),
      inlay: isFull ? HATCH : 0,
      casing: 1,
      outline: tier === 'focus' ? 1 : 0,
      caps: 0,
      z: TIER_LEVEL[tier] + lift,
    }
  }
  const kindOf = (span: Span): EdgeKind => (tiers[span.chain] === 'far' ? 'line' : 'tube')
  const under = underBits(geometry.spans, crossingsOf(geometry.spans), tiers)
  geometry.spans.forEach((span, i) =>
    edges.push(edgeFrom(ascending(span), kindOf(span), { ...look(span, isUpright(span) ? 1 : 0), ...under.get(i) })),
  )
}

function ascending(stroke: Stroke): Stroke {
  const { x1, y1, x2, y2, chain } = stroke
  return x1 + y1 <= x2 + y2 ? stroke : { chain, x1: x2, y1: y2, x2: x1, y2: y1 }
}

function addHeldChains(input: SceneInput, tiers: readonly Tier[], edges: SceneEdge[]): void {
  const { tokens, geometry } = input
  for (const band of geometry.bands) {
    const tier = tiers[band.chain]!
    const z = TIER_LEVEL[tier] + (isUpright(band) ? 1 : 0)
    if (tier === 'focus')
      edges.push(edgeFrom(band, 'band', { size: 1.45, color: tokens.paper, z, casing: 1, outline: 1 }))
    else {
      const color = tier === 'far' ? tokens.rule : tokens.edge
      edges.push(edgeFrom(band, 'line', { size: SCENE_DEFAULTS.heldWidth, color, z }))
    }
  }
}

function addJoints(input: SceneInput, tiers: readonly Tier[], edges: SceneEdge[], nodes: SceneNode[]): void {
  const { tokens, lens, geometry, hues } = input
  for (const joint of geometry.joints) {
    const tier = tiers[joint.chain]!
    const grey =
      tier === 'far' ? tokens.rule : tier === 'focus' ? tokens.ink : lens === 'load' ? tokens.ink : tokens.edge
    const color = lens === 'occupancy' ? colourOf(input, joint.chain, tier) : grey
    const z = TIER_LEVEL[tier] + 3
    if (joint.kind === 'crossing') {
      const isFocus = tier === 'focus' && lens === 'occupancy'
      const size = lens === 'occupancy' ? 0.68 * (tier === 'focus' ? 1.15 : widthOf(tier)) : 0.4
      const rim = isFocus ? tokens.paper : color
      nodes.push({ ...mark(joint), shape: 'square', size, color, rim, rimWidth: isFocus ? 1 : 0, halo: 0 })
    } else if (joint.kind === 'bridge') {
      const size = lens === 'occupancy' ? 0.8 * Math.min(1, widthOf(tier)) : SCENE_DEFAULTS.heldWidth * 0.8
      const inlay = lens === 'occupancy' && tier !== 'far' ? hues.inlay[joint.chain]! % 2 : 0
      edges.push(edgeFrom(joint, lens === 'occupancy' ? 'band' : 'line', { size, color, inlay, z }))
    } else if (lens === 'load' && tier !== 'far') {
      edges.push(edgeFrom(joint, 'line', { size: 0.35, color, z, caps: 0 }))
    }
  }
}

const mark = (joint: Pick<Joint, 'x1' | 'y1' | 'x2' | 'y2' | 'chain'>) => ({
  x: (joint.x1 + joint.x2) / 2,
  y: (joint.y1 + joint.y2) / 2,
  chain: joint.chain,
})

/** Rings on the chain in focus at every coupler that carries an interaction. */
function addRings({ data, geometry, tokens, focused }: SceneInput, nodes: SceneNode[]): void {
  if (focused === null) return
  for (const coupler of geometry.roles.interactionCouplers) {
    const end: number = geometry.roles.owner[data.ends[2 * coupler]!] === focused ? 0 : 1
    if (geometry.roles.owner[data.ends[2 * coupler + end]!] !== focused) continue
    const x = data.places[4 * coupler + 2 * end]!
    const y = data.places[4 * coupler + 2 * end + 1]!
    nodes.push({
      x,
      y,
      shape: 'circle',
      size: 0.43,
      color: tokens.paper,
      rim: tokens.ink,
      rimWidth: 1.3,
      halo: 0,
      chain: focused,
    })
  }
}

function addGlyphs({ geometry, tokens, focused }: SceneInput, read: ReadLayer, nodes: SceneNode[]): void {
  const near = focused === null ? null : new Set([focused, ...geometry.neighbours[focused]!])
  for (const span of geometry.spans) {
    const spin = read.spins[span.qubit]
    if (!spin) continue
    const rim = near && !near.has(span.chain) ? tokens.edge : tokens.ink
    nodes.push({
      ...mark(span),
      shape: spin > 0 ? 'up' : 'down',
      size: 0.88,
      color: spin > 0 ? rim : tokens.paper,
      rim,
      rimWidth: 1.2,
      halo: 1,
    })
  }
}

function addBreaks(input: SceneInput, edges: SceneEdge[], breaks: Break[]): void {
  const spanOf = new Map<number, Band | Span>(input.geometry.spans.map((span) => [span.qubit, span]))
  for (const joint of input.geometry.joints) {
    const rate = rateOf(input, joint)
    if (rate === null) continue
    const size = SCENE_DEFAULTS.heldWidth + 0.75 * Math.sqrt(rate)
    for (let end = 0; end < 2; end++) {
      const x = end === 0 ? joint.x1 : joint.x2
      const y = end === 0 ? joint.y1 : joint.y2
      if (isOfPoints(input)) continue
      const arm = armAlong(spanOf.get(input.data.ends[2 * joint.coupler + end]!)!, x, y)
      edges.push(
        edgeFrom({ ...arm, chain: joint.chain }, 'dash', { size, color: input.tokens.clay, casing: 1, caps: 0, z: 40 }),
      )
    }
    if (Math.hypot(joint.x2 - joint.x1, joint.y2 - joint.y1) > 1e-3)
      edges.push(edgeFrom(joint, 'dash', { size, color: input.tokens.clay, casing: 1, caps: 0, z: 40 }))
    breaks.push({ ...mark(joint), coupler: joint.coupler, rate })
  }
}

/** Share of reads in which the joint's coupler disagreed, 1 or nothing for a single read; null when not drawn. */
function rateOf({ data, breaks, read }: SceneInput, { coupler }: Joint): number | null {
  if (read) {
    const product = read.spins[data.ends[2 * coupler]!]! * read.spins[data.ends[2 * coupler + 1]!]!
    return product < 0 ? 1 : null
  }
  if (!breaks) return null
  const rate =
    breaks.couplerRate instanceof Float64Array ? breaks.couplerRate[coupler] : breaks.couplerRate.get(coupler)
  return rate !== undefined && rate >= SCENE_DEFAULTS.leastBreak ? rate : null
}

/** From the coupler along its qubit, towards the longer side of what the qubit needs. */
function armAlong(span: Pick<Span, 'x1' | 'y1' | 'x2' | 'y2'>, x: number, y: number) {
  const toFirst = Math.hypot(span.x1 - x, span.y1 - y)
  const toSecond = Math.hypot(span.x2 - x, span.y2 - y)
  const [tx, ty, reach] = toFirst > toSecond ? [span.x1, span.y1, toFirst] : [span.x2, span.y2, toSecond]
  const share = reach === 0 ? 0 : Math.min(1, SCENE_DEFAULTS.breakArm / reach)
  return { x1: x, y1: y, x2: x + share * (tx - x), y2: y + share * (ty - y) }
}
