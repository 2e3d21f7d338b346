import type Sigma from 'sigma'
import type { MouseCoords } from 'sigma/types'
import type { View } from './types'

/* What all drawings by sigma share: settings, how marks look, and the camera in terms of a view. */

export interface CameraEvents {
  /** After every frame, and whenever the camera moved. */
  onFrame(view: View): void
  /** A click or tap that was no drag, in pixels of the viewport. */
  onClick(x: number, y: number, additive: boolean): void
}

type Seen = Pick<Sigma, 'graphToViewport' | 'getCamera'>
type Moved = Seen & Pick<Sigma, 'getDimensions' | 'graphToFramedGraph'>

export const CAMERA_SETTINGS = {
  itemSizesReference: 'screen',
  stagePadding: 0,
  renderLabels: false,
  renderEdgeLabels: false,
  // What lies under the pointer is read off the geometry: a picking pass would double the work of every frame.
  enableEdgeEvents: false,
  pickingDownSizingRatio: 8,
  enableCameraRotation: false,
  zoomingRatio: 1.35,
  inertiaDuration: 160,
  allowInvalidContainer: true,
} as const

export const MARK_VARIABLES = {
  rim: { type: 'color', default: '#000000' },
  rimWidth: { type: 'number', default: 0 },
  halo: { type: 'number', default: 0 },
} as const

export const MARK_STYLE = {
  x: { attribute: 'x' },
  y: { attribute: 'y' },
  size: { attribute: 'size' },
  color: { attribute: 'color' },
  zIndex: { attribute: 'z' },
  rim: { attribute: 'rim' },
  rimWidth: { attribute: 'rimWidth' },
  halo: { attribute: 'halo' },
} as const

/** Where the drawing lies in the viewport at this moment. */
export function viewOf(sigma: Seen): View {
  const origin = sigma.graphToViewport({ x: 0, y: 0 })
  return { scale: sigma.graphToViewport({ x: 1, y: 0 }).x - origin.x, x: origin.x, y: origin.y }
}

/** Pixels of a unit of the drawing while the camera shows all of it. */
export const unitScaleOf = (sigma: Seen): number => viewOf(sigma).scale * sigma.getCamera().ratio

export function moveCamera(sigma: Moved, target: View, milliseconds: number): void {
  const { width, height } = sigma.getDimensions()
  const centre = sigma.graphToFramedGraph({
    x: (width / 2 - target.x) / target.scale,
    y: -(height / 2 - target.y) / target.scale,
  })
  const state = { ...centre, angle: 0, ratio: unitScaleOf(sigma) / target.scale }
  if (milliseconds > 0) void sigma.getCamera().animate(state, { duration: milliseconds })
  else sigma.getCamera().setState(state)
}

/** While the container is hidden, or the window has no size, what the camera says is nonsense. */
export const hasRoom = ({ clientWidth, clientHeight }: HTMLElement): boolean => clientWidth > 0 && clientHeight > 0

/** What sigma tells of a click, as its receiver wants it. */
export const clickTo =
  (onClick: CameraEvents['onClick']) =>
  ({ event: { x, y, original } }: { event: MouseCoords }): void =>
    onClick(x, y, original.shiftKey || original.ctrlKey || original.metaKey)

/** An empty layer of the size of the viewport still costs a quarter of every frame where no graphics card blends it. */
export function hideIf(isEmpty: boolean, sigma: Pick<Sigma, 'getWebGLContext'>): void {
  const { canvas } = sigma.getWebGLContext()
  if (canvas instanceof HTMLCanvasElement) canvas.style.opacity = isEmpty ? '0' : '1'
}
