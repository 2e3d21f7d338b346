/** The elements that the drawing consists of, from the lowest to the highest. */
export interface Layers {
  readonly back: HTMLCanvasElement
  readonly front: HTMLCanvasElement
  /** Takes the camera's gestures. */
  readonly container: HTMLElement
  readonly tags: HTMLCanvasElement
  readonly rulerTop: HTMLCanvasElement
  readonly rulerLeft: HTMLCanvasElement
  remove(): void
}

/**
 * Makes the layers.
 *
 * @param frame element that clips the lattice
 * @param margin element around the frame that leaves room for the ruler above and to the left
 */
export function createLayers(frame: HTMLElement, margin: HTMLElement): Layers {
  const [back, front, tags] = [layer(), layer(), layer()]
  const [rulerTop, rulerLeft] = [layer(), layer()]
  const container = document.createElement('div')
  Object.assign(container.style, { position: 'absolute', inset: '0' })
  back.width = back.height = 0
  frame.prepend(back, front, container, tags)
  margin.prepend(rulerTop, rulerLeft)
  return {
    back,
    front,
    container,
    tags,
    rulerTop,
    rulerLeft,
    remove() {
      for (const element of [back, front, container, tags, rulerTop, rulerLeft]) element.remove()
    },
  }
}

function layer(): HTMLCanvasElement {
  const canvas = document.createElement('canvas')
  canvas.setAttribute('aria-hidden', 'true')
  Object.assign(canvas.style, {
    position: 'absolute',
    left: '0',
    top: '0',
    maxWidth: 'none',
    pointerEvents: 'none',
    transformOrigin: '0 0',
    willChange: 'transform',
  })
  return canvas
}
