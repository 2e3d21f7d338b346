export interface RulerTick {
  /** Line of the lattice. */
  readonly line: number
  /** Viewport pixel. */
  readonly at: number
  /** Written beside the tick; ticks between have none. */
  readonly text: string | null
}

export const RULER_DEFAULTS = {
  /** A number every so many lines, and a short tick half-way. */
  every: 12,
  /** Least distance between two numbers, in pixels. */
  clearance: 44,
}

/**
 * Ticks of a map ruler along one side: a number every 12 lines (24, 48 … when those would crowd) and a tick half-way.
 *
 * @param extent length of the side in pixels; ticks outside it are left out
 * @param limits first and last line the lattice has
 */
export function rulerTicks(
  origin: number,
  scale: number,
  extent: number,
  limits: readonly [number, number],
  { every, clearance } = RULER_DEFAULTS,
): RulerTick[] {
  let step = every
  while (step * scale < clearance) step *= 2
  const half = step / 2
  const first = Math.max(Math.ceil(-origin / scale / half), Math.ceil(limits[0] / half))
  const last = Math.min(Math.floor((extent - origin) / scale / half), Math.floor(limits[1] / half))
  const ticks: RulerTick[] = []
  for (let k = first; k <= last; k++) {
    const line = k * half
    ticks.push({ line, at: origin + line * scale, text: k % 2 === 0 ? String(line) : null })
  }
  return ticks
}
