/** Sizes and clears a canvas; afterwards one unit of its context is one CSS pixel. */
export function prepareCanvas(context: CanvasRenderingContext2D, width: number, height: number): void {
  const { canvas } = context
  const ratio = window.devicePixelRatio || 1
  const [pixelWidth, pixelHeight] = [Math.round(width * ratio), Math.round(height * ratio)]
  if (canvas.width !== pixelWidth) canvas.width = pixelWidth
  if (canvas.height !== pixelHeight) canvas.height = pixelHeight
  canvas.style.width = `${width}px`
  canvas.style.height = `${height}px`
  context.setTransform(ratio, 0, 0, ratio, 0, 0)
  context.clearRect(0, 0, width, height)
}
