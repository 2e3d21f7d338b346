/** A label that asks for a place beside a point, in pixels. */
export interface LabelRequest {
  readonly text: string
  readonly x: number
  readonly y: number
  /** Free room to keep around the point. */
  readonly radius: number
  readonly width: number
  readonly height: number
  /** Placed even where it covers others. */
  readonly insists: boolean
}

export interface PlacedLabel {
  readonly request: LabelRequest
  /** Left and upper edge. */
  readonly x: number
  readonly y: number
}

const GAP = 2

/** Whether a label at (x, y) lies over a mark. */
function covers(mark: Obstacle, x: number, y: number, { width, height }: LabelRequest): boolean {
  const right = mark.x - Math.min(x + width, Math.max(x, mark.x))
  const down = mark.y - Math.min(y + height, Math.max(y, mark.y))
  return right * right + down * down < mark.radius * mark.radius
}

/** Beside the point: right, left, above, below. */
const sides = ({ x, y, radius, width, height }: LabelRequest): [number, number][] => [
  [x + radius + GAP, y - height / 2],
  [x - radius - GAP - width, y - height / 2],
  [x - width / 2, y - radius - GAP - height],
  [x - width / 2, y + radius + GAP],
]

/** A mark that labels keep off. */
export interface Obstacle {
  readonly x: number
  readonly y: number
  readonly radius: number
}

/**
 * Gives each label, in the order asked, the first of four sides where it covers no mark and no label before it and lies
 * inside the frame; labels that find none are left out unless they insist.
 */
export function placeLabels(
  requests: readonly LabelRequest[],
  width: number,
  height: number,
  obstacles: readonly Obstacle[] = [],
): PlacedLabel[] {
  const placed: PlacedLabel[] = []
  const isFree = (request: LabelRequest, x: number, y: number) =>
    x >= 0 &&
    y >= 0 &&
    x + request.width <= width &&
    y + request.height <= height &&
    placed.every(
      (other) =>
        x >= other.x + other.request.width + GAP ||
        other.x >= x + request.width + GAP ||
        y >= other.y + other.request.height ||
        other.y >= y + request.height,
    ) &&
    obstacles.every((mark) => !covers(mark, x, y, request))
  for (const request of requests) {
    const options = sides(request)
    const found = options.find(([x, y]) => isFree(request, x, y)) ?? (request.insists ? options[0] : undefined)
    if (found) placed.push({ request, x: found[0], y: found[1] })
  }
  return placed
}
