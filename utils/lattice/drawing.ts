import Sigma from 'sigma'
import type { MouseCoords } from 'sigma/types'
import type { SDFShape } from 'sigma/rendering'
import { pathLine, sdfCircle, sdfSquare } from 'sigma/rendering'
import { bandLayer, glyphLayer } from './band-layer'
import type { EdgeVariable } from './band-layer'
import { bandWidth } from './framing'
import { sceneGraph } from './to-graph'
import type { Scene } from './scene-types'
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

export interface DrawingEvents {
  /** After every frame, and whenever the camera moved. */
  onFrame(view: View): void
  /** A click or tap that was no drag, in pixels of the viewport. */
  onClick(x: number, y: number, additive: boolean): void
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
  readonly events: DrawingEvents
}

/** @throws Error when the browser offers no WebGL 2 */
export function createDrawing(container: HTMLElement, { bounds, tokens, scene, events }: DrawingOptions): Drawing {
  let unitScale = Math.min(
    container.clientWidth / (bounds.x2 - bounds.x1),
    container.clientHeight / (bounds.y2 - bounds.y1),
  )
  const sigma = new Sigma(sceneGraph(scene), container, {
    primitives: {
      nodes: { shapes: [sdfCircle(), sdfSquare(), UP, DOWN], layers: [glyphLayer(tokens)], variables: NODE_VARIABLES },
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

  const view = (): View => {
    const origin = sigma.graphToViewport({ x: 0, y: 0 })
    return { scale: sigma.graphToViewport({ x: 1, y: 0 }).x - origin.x, x: origin.x, y: origin.y }
  }
  const measure = () => {
    unitScale = view().scale * sigma.getCamera().ratio
    sigma.setSetting('minCameraRatio', Math.min(1, unitScale / DRAWING_DEFAULTS.largestScale))
  }
  measure()
  sigma.on('resize', measure)
  sigma.on('afterRender', () => events.onFrame(view()))
  const onClick = ({ event: { x, y, original } }: { event: MouseCoords }) => {
    const { shiftKey, ctrlKey, metaKey } = original
    events.onClick(x, y, shiftKey || ctrlKey || metaKey)
  }
  sigma.on('clickStage', onClick)
  sigma.on('clickNode', onClick)

  hideIfEmpty(sigma, scene)

  return {
    show(next) {
      sigma.setGraph(sceneGraph(next))
      hideIfEmpty(sigma, next)
    },
    view,
    moveTo(target, milliseconds = 0) {
      const { width, height } = sigma.getDimensions()
      const centre = sigma.graphToFramedGraph({
        x: (width / 2 - target.x) / target.scale,
        y: -(height / 2 - target.y) / target.scale,
      })
      const state = { ...centre, angle: 0, ratio: unitScale / target.scale }
      if (milliseconds > 0) void sigma.getCamera().animate(state, { duration: milliseconds })
      else sigma.getCamera().setState(state)
    },
    refresh: () => void sigma.refresh(),
    kill: () => sigma.kill(),
  }
}

/** An empty layer of the size of the viewport still costs a quarter of every frame where no graphics card blends it. */
function hideIfEmpty(sigma: { getWebGLContext(): WebGL2RenderingContext }, { edges, nodes }: Scene): void {
  const { canvas } = sigma.getWebGLContext()
  if (canvas instanceof HTMLCanvasElement) canvas.style.opacity = edges.length + nodes.length > 0 ? '1' : '0'
}

const SETTINGS = {
  itemSizesReference: 'screen',
  stagePadding: 0,
  antialiasEdges: false,
  minEdgeThickness: 2.2,
  renderLabels: false,
  renderEdgeLabels: false,
  // Which band lies under the pointer is read off the geometry: a picking pass would double the work of every frame.
  enableEdgeEvents: false,
  pickingDownSizingRatio: 8,
  enableCameraRotation: false,
  maxCameraRatio: DRAWING_DEFAULTS.furthest,
  zoomingRatio: 1.35,
  inertiaDuration: 160,
  allowInvalidContainer: true,
} as const

const NODE_VARIABLES = {
  rim: { type: 'color', default: '#000000' },
  rimWidth: { type: 'number', default: 0 },
  halo: { type: 'number', default: 0 },
} as const

const NODE_STYLE = {
  x: { attribute: 'x' },
  y: { attribute: 'y' },
  size: { attribute: 'size' },
  color: { attribute: 'color' },
  shape: { attribute: 'shape' },
  zIndex: { attribute: 'z' },
  rim: { attribute: 'rim' },
  rimWidth: { attribute: 'rimWidth' },
  halo: { attribute: 'halo' },
} as const

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
