import { EDGE_KINDS } from './scene-types'
import type { EdgeKind, SceneEdge } from './scene-types'

export interface Stroke {
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
  readonly chain: number
}

export type EdgeLook = Partial<SceneEdge> & { readonly size: number; readonly color: string; readonly z: number }

const NO_GAPS: readonly number[] = []

export function edgeFrom({ x1, y1, x2, y2, chain }: Stroke, kind: EdgeKind, look: EdgeLook): SceneEdge {
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
    gaps: NO_GAPS,
    ...look,
  }
}

export const isUpright = ({ x1, y1, x2, y2 }: Omit<Stroke, 'chain'>): boolean => Math.abs(x2 - x1) < Math.abs(y2 - y1)

/** The stroke from its lower end. */
export function ascending(stroke: Stroke): Stroke {
  const { x1, y1, x2, y2, chain } = stroke
  return x1 + y1 <= x2 + y2 ? stroke : { chain, x1: x2, y1: y2, x2: x1, y2: y1 }
}

export const middleOf = ({ x1, y1, x2, y2, chain }: Stroke) => ({ x: (x1 + x2) / 2, y: (y1 + y2) / 2, chain })
