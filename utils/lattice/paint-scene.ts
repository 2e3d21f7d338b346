import { bandWidth } from './framing'
import { paintEdges } from './paint-edges'
import type { Canvas2D } from './paint-edges'
import { paintMarks } from './paint-marks'
import { isOfPoints } from './scene'
import type { Scene, SceneEdge, SceneNode } from './scene-types'
import type { Tokens } from './tokens'
import type { Box, LatticeData, View } from './types'

/** A scene sorted into levels, ready to be painted at any zoom. */
export interface LevelledScene {
  readonly levels: readonly (readonly SceneEdge[])[]
  readonly nodes: readonly SceneNode[]
}

export function levelScene({ edges, nodes }: Pick<Scene, 'edges' | 'nodes'>): LevelledScene {
  const levels = new Map<number, SceneEdge[]>()
  for (const edge of edges) {
    const level = levels.get(edge.z)
    if (level) level.push(edge)
    else levels.set(edge.z, [edge])
  }
  return { levels: [...levels].sort(([a], [b]) => a - b).map(([, level]) => level), nodes }
}

export interface SceneScale {
  /** Size of the canvas in pixels. */
  readonly width: number
  readonly height: number
  /** Width of a band, and largest radius of a mark, in pixels. */
  readonly bandPixels: number
  readonly largestMark: number
}

/** Marks of neighbouring qubits of a lattice of points stay apart when seen from afar. */
export const sceneScale = (
  data: Pick<LatticeData, 'segments'>,
  { scale }: View,
  { width, height }: { readonly width: number; readonly height: number },
): SceneScale => ({
  width,
  height,
  bandPixels: bandWidth(scale),
  largestMark: isOfPoints(data) ? 0.46 * scale : Infinity,
})

/** Paints the scene; yields between steps so that the caller may pause. */
export function* paintScene(
  ctx: Canvas2D,
  { levels, nodes }: LevelledScene,
  view: View,
  size: SceneScale,
  tokens: Tokens,
): Generator<void> {
  const { bandPixels } = size
  const seen = seenBox(view, size, bandPixels)
  for (const level of levels) {
    paintEdges(
      ctx,
      level.filter((edge) => isSeen(edge, seen)),
      view,
      bandPixels,
      tokens,
    )
    yield
  }
  const near = nodes.filter(({ x, y }) => isSeen({ x1: x, y1: y, x2: x, y2: y }, seen))
  paintMarks(ctx, near, view, bandPixels, size.largestMark, tokens)
}

/** What the canvas shows, in line spacings, with room for the width of a band. */
function seenBox({ scale, x, y }: View, { width, height }: { width: number; height: number }, room: number): Box {
  return {
    x1: (-room - x) / scale,
    y1: (-room - y) / scale,
    x2: (width + room - x) / scale,
    y2: (height + room - y) / scale,
  }
}

const isSeen = ({ x1, y1, x2, y2 }: Box, seen: Box): boolean =>
  Math.max(x1, x2) >= seen.x1 &&
  Math.min(x1, x2) <= seen.x2 &&
  Math.max(y1, y2) >= seen.y1 &&
  Math.min(y1, y2) <= seen.y2
