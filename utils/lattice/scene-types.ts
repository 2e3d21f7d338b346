import type { ChainHues } from '~/utils/hues'
import type { ChainGeometry } from './geometry'
import type { LatticeKind } from './kinds'
import type { Tokens } from './tokens'
import type { BreakLayer, HeatLayer, LatticeData, Lens, LoadLayer, ReadLayer } from './types'

/** What an edge of the drawing looks like; the numbers are those the shader switches on. */
export const EDGE_KINDS = { line: 0, band: 1, tube: 2, dash: 3 } as const
export type EdgeKind = keyof typeof EDGE_KINDS

/** Inlays 0 … 2 as in utils/hues; a tube may be hatched instead. */
export const HATCH = 3

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
  /** Lines of the lattice on which the edge passes under those drawn before it: there it is left out. */
  readonly gaps: readonly number[]
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
  /** Chains selected together; without a chain in focus the others step back. */
  readonly selected?: ReadonlySet<number>
  /** Chains that step back because the legend switched their class off. */
  readonly muted?: ReadonlySet<number>
  readonly hiddenKinds?: ReadonlySet<LatticeKind>
  readonly breaks?: BreakLayer | null
  readonly load?: LoadLayer | null
  readonly read?: ReadLayer | null
  readonly heat?: HeatLayer | null
  /** Only the chain in focus, or only all that is not: the two are drawn apart. */
  readonly part?: 'focus' | 'rest'
}

/** A scene in the making. */
export interface Draft {
  readonly nodes: SceneNode[]
  readonly edges: SceneEdge[]
  readonly breaks: Break[]
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
