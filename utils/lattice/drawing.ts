import Sigma from 'sigma'
import type { SDFShape } from 'sigma/rendering'
import { pathLine, sdfCircle, sdfSquare } from 'sigma/rendering'
import { bandLayer, glyphLayer } from './band-layer'
import type { EdgeVariable } from './band-layer'
import { bandWidth } from './framing'
import { sceneGraph } from './to-graph'
import type { Scene } from './scene-types'
import {
  CAMERA_SETTINGS,
  clickTo,
  hasRoom,
  hideIf,
  MARK_STYLE,
  MARK_VARIABLES,
  moveCamera,
  unitScaleOf,
  viewOf,
} from './sigma-camera'
import type { CameraEvents } from './sigma-camera'
import type { Box, View } from './types'
import type { Tokens } from './tokens'

/** Camera and gestures, and the chain in focus drawn sharply at every moment: what carries the meaning. All by sigma. */
export interface Drawing {
  show(scene: Scene): void
  /** Where the lattice lies in the viewport at this moment. */
  view(): View
  moveTo(view: View, milliseconds?: number): void
  refresh(): void
  kill(): void
}

export const DRAWING_DEFAULTS = {
  /** Largest line spacing in pixels, and how far out one may zoom beyond the whole machine. */
  largestScale: 64,
  furthest: 1.6,
}

export interface DrawingOptions {
  readonly bounds: Box
  readonly tokens: Tokens
  readonly scene: Scene
  readonly events: CameraEvents
}

/** @throws Error when the browser offers no WebGL 2 */
export function createDrawing(container: HTMLElement, { bounds, tokens, scene, events }: DrawingOptions): Drawing {
  let unitScale = Math.min(
    container.clientWidth / (bounds.x2 - bounds.x1),
    container.clientHeight / (bounds.y2 - bounds.y1),
  )
  const sigma = new Sigma(sceneGraph(scene), container, {
    primitives: {
      nodes: { shapes: [sdfCircle(), sdfSquare(), UP, DOWN], layers: [glyphLayer(tokens)], variables: MARK_VARIABLES },
      edges: { paths: [pathLine()], extremities: [], layers: [bandLayer(tokens)], variables: EDGE_VARIABLE_TYPES },
    },
    styles: { nodes: NODE_STYLE, edges: EDGE_STYLE },
    settings: {
      ...SETTINGS,
      zoomToSizeRatioFunction: (ratio) => 1 / bandWidth(unitScale / ratio),
    },
  })
  sigma.setCustomBBox({ x: [bounds.x1, bounds.x2], y: [-bounds.y2, -bounds.y1] })
  sigma.refresh()

  const measure = () => {
    if (!hasRoom(container)) return
    unitScale = unitScaleOf(sigma)
    sigma.setSetting('minCameraRatio', Math.min(1, unitScale / DRAWING_DEFAULTS.largestScale))
  }
  measure()
  sigma.on('resize', measure)
  sigma.on('afterRender', () => hasRoom(container) && events.onFrame(viewOf(sigma)))
  sigma.on('clickStage', clickTo(events.onClick))
  sigma.on('clickNode', clickTo(events.onClick))

  hideIf(isEmpty(scene), sigma)

  return {
    show(next) {
      sigma.setGraph(sceneGraph(next))
      hideIf(isEmpty(next), sigma)
    },
    view: () => viewOf(sigma),
    moveTo: (target, milliseconds = 0) => moveCamera(sigma, target, milliseconds),
    refresh: () => void sigma.refresh(),
    kill: () => sigma.kill(),
  }
}

const isEmpty = ({ edges, nodes }: Scene): boolean => edges.length + nodes.length === 0

const SETTINGS = {
  ...CAMERA_SETTINGS,
  antialiasEdges: false,
  minEdgeThickness: 2.2,
  maxCameraRatio: DRAWING_DEFAULTS.furthest,
} as const

const NODE_STYLE = { ...MARK_STYLE, shape: { attribute: 'shape' } } as const

const number = { type: 'number', default: 0 } as const
const EDGE_VARIABLE_TYPES = {
  kind: number,
  from: number,
  span: number,
  value: number,
  inlay: number,
  casing: number,
  outline: number,
  caps: number,
} as const satisfies Record<EdgeVariable, typeof number>

const EDGE_STYLE = {
  size: { attribute: 'size' },
  color: { attribute: 'color' },
  zIndex: { attribute: 'z' },
  kind: { attribute: 'kind' },
  from: { attribute: 'from' },
  span: { attribute: 'span' },
  value: { attribute: 'value' },
  inlay: { attribute: 'inlay' },
  casing: { attribute: 'casing' },
  outline: { attribute: 'outline' },
  caps: { attribute: 'caps' },
} as const

/** Equilateral triangles with `size` as the distance of a corner from the middle. */
const triangle = (name: string, sign: string): SDFShape => ({
  name,
  uniforms: [],
  inradiusFactor: 0.5,
  glsl: /* glsl */ `
float sdf_${name}(vec2 uv, float size) {
  float y = ${sign}uv.y;
  return max(0.866 * abs(uv.x) + 0.5 * y - 0.5 * size, -y - 0.5 * size);
}
`,
})
const UP = triangle('up', '')
const DOWN = triangle('down', '-')
