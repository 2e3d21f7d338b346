import Graph from 'graphology'
import Sigma from 'sigma'
import { sdfCircle } from 'sigma/rendering'
import { glyphLayer } from '../lattice/band-layer'
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
} from '../lattice/sigma-camera'
import type { CameraEvents } from '../lattice/sigma-camera'
import type { Tokens } from '../lattice/tokens'
import type { View } from '../lattice/types'

/** The mark of a variable; x and y as framed, sizes in pixels at the scale that shows all. */
export interface GraphMark {
  readonly x: number
  readonly y: number
  readonly size: number
  readonly color: string
  readonly rim: string
  readonly rimWidth: number
  readonly halo: number
  readonly z: number
}

/** The live drawing of a problem graph: sigma for camera, gestures and the marks of the variables. */
export interface GraphDrawing {
  show(marks: readonly GraphMark[]): void
  view(): View
  /** Factor by which marks are larger now than at the scale that shows all. */
  growth(): number
  moveTo(view: View, milliseconds?: number): void
  refresh(): void
  kill(): void
}

const CAMERA = { closest: 0.02, furthest: 1.8 }

/** @throws Error when the browser offers no WebGL 2 */
export function createGraphDrawing(container: HTMLElement, tokens: Tokens, events: CameraEvents): GraphDrawing {
  const sigma = new Sigma(graphOfMarks([]), container, {
    primitives: { nodes: { shapes: [sdfCircle()], layers: [glyphLayer(tokens)], variables: MARK_VARIABLES } },
    styles: { nodes: STYLE },
    settings: SETTINGS,
  })
  sigma.setCustomBBox({ x: [-1, 1], y: [-1, 1] })
  sigma.refresh()

  sigma.on('afterRender', () => hasRoom(container) && events.onFrame(viewOf(sigma)))
  sigma.on('clickStage', clickTo(events.onClick))
  sigma.on('clickNode', clickTo(events.onClick))

  return {
    show(marks) {
      sigma.setGraph(graphOfMarks(marks))
      hideIf(marks.length === 0, sigma)
    },
    growth: () => Math.sqrt(viewOf(sigma).scale / unitScaleOf(sigma)),
    view: () => viewOf(sigma),
    moveTo: (target, milliseconds = 0) => moveCamera(sigma, target, milliseconds),
    refresh: () => void sigma.resize(true).refresh(),
    kill: () => sigma.kill(),
  }
}

/** Marks as nodes without edges: the lines are drawn beneath, by their own layers. */
function graphOfMarks(marks: readonly GraphMark[]) {
  const graph = new Graph<GraphMark>()
  // Without any node sigma neither draws nor follows its camera.
  graph.addNode('anchor', { x: 0, y: 0, size: 0, color: '#000000', rim: '#000000', rimWidth: 0, halo: 0, z: 0 })
  marks.forEach((mark, k) => graph.addNode(k, { ...mark, y: -mark.y }))
  return graph
}

const SETTINGS = {
  ...CAMERA_SETTINGS,
  zoomToSizeRatioFunction: Math.sqrt,
  minCameraRatio: CAMERA.closest,
  maxCameraRatio: CAMERA.furthest,
} as const

const STYLE = { ...MARK_STYLE, shape: 'circle' } as const
