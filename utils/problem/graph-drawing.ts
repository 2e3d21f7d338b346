import Graph from 'graphology'
import Sigma from 'sigma'
import { sdfCircle } from 'sigma/rendering'
import { glyphLayer } from '../lattice/band-layer'
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
  moveTo(view: View, milliseconds?: number): void
  refresh(): void
  kill(): void
}

export interface GraphDrawingEvents {
  onFrame(view: View): void
  /** A click or tap that was no drag, in pixels of the viewport. */
  onClick(x: number, y: number, isAdditive: boolean): void
}

const CAMERA = { closest: 0.02, furthest: 1.8 }

/** @throws Error when the browser offers no WebGL 2 */
export function createGraphDrawing(container: HTMLElement, tokens: Tokens, events: GraphDrawingEvents): GraphDrawing {
  const sigma = new Sigma(graphOfMarks([]), container, {
    primitives: { nodes: { shapes: [sdfCircle()], layers: [glyphLayer(tokens)], variables: VARIABLES } },
    styles: { nodes: STYLE },
    settings: SETTINGS,
  })
  sigma.setCustomBBox({ x: [-1, 1], y: [-1, 1] })
  sigma.refresh()

  const view = (): View => {
    const origin = sigma.graphToViewport({ x: 0, y: 0 })
    return { scale: sigma.graphToViewport({ x: 1, y: 0 }).x - origin.x, x: origin.x, y: origin.y }
  }
  const click = ({ event }: { event: { x: number; y: number; original: MouseEvent | TouchEvent } }) => {
    const { ctrlKey, metaKey, shiftKey } = event.original
    events.onClick(event.x, event.y, ctrlKey || metaKey || shiftKey)
  }
  sigma.on('afterRender', () => events.onFrame(view()))
  sigma.on('clickStage', click)
  sigma.on('clickNode', click)

  return {
    show: (marks) => void sigma.setGraph(graphOfMarks(marks)),
    view,
    moveTo(target, milliseconds = 0) {
      const { width, height } = sigma.getDimensions()
      const centre = sigma.graphToFramedGraph({
        x: (width / 2 - target.x) / target.scale,
        y: -(height / 2 - target.y) / target.scale,
      })
      const ratio = (view().scale * sigma.getCamera().ratio) / target.scale
      const state = { ...centre, angle: 0, ratio }
      if (milliseconds > 0) void sigma.getCamera().animate(state, { duration: milliseconds })
      else sigma.getCamera().setState(state)
    },
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
  itemSizesReference: 'screen',
  stagePadding: 0,
  renderLabels: false,
  renderEdgeLabels: false,
  // Which mark lies under the pointer is read off the positions: a picking pass would double the work of every frame.
  enableEdgeEvents: false,
  pickingDownSizingRatio: 8,
  enableCameraRotation: false,
  minCameraRatio: CAMERA.closest,
  maxCameraRatio: CAMERA.furthest,
  zoomingRatio: 1.35,
  inertiaDuration: 160,
  allowInvalidContainer: true,
} as const

const VARIABLES = {
  rim: { type: 'color', default: '#000000' },
  rimWidth: { type: 'number', default: 0 },
  halo: { type: 'number', default: 0 },
} as const

const STYLE = {
  x: { attribute: 'x' },
  y: { attribute: 'y' },
  size: { attribute: 'size' },
  color: { attribute: 'color' },
  shape: 'circle',
  zIndex: { attribute: 'z' },
  rim: { attribute: 'rim' },
  rimWidth: { attribute: 'rimWidth' },
  halo: { attribute: 'halo' },
} as const
