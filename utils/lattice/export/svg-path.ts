/** A coordinate with at most two decimals, a hundredth of a pixel. */
export const at = (value: number): string => String(Math.round(100 * value) / 100 || 0)

/** Path data in the making, from the path calls of a canvas. */
export interface SvgPath {
  moveTo(x: number, y: number): void
  lineTo(x: number, y: number): void
  rect(x: number, y: number, width: number, height: number): void
  arc(x: number, y: number, radius: number, from: number, to: number): void
  closePath(): void
  data(): string
}

export function createSvgPath(): SvgPath {
  const parts: string[] = []
  const put = (command: string, ...values: number[]) => void parts.push(command + values.map(at).join(' '))
  return {
    moveTo: (x, y) => put('M', x, y),
    lineTo: (x, y) => put('L', x, y),
    rect: (x, y, width, height) => {
      put('M', x, y)
      put('h', width)
      put('v', height)
      put('h', -width)
      parts.push('Z')
    },
    /** Clockwise, as a canvas draws it unless told otherwise. */
    arc(x, y, radius, from, to) {
      const turn = 2 * Math.PI
      const sweep = to - from >= turn ? turn : (((to - from) % turn) + turn) % turn
      put(parts.length === 0 ? 'M' : 'L', x + radius * Math.cos(from), y + radius * Math.sin(from))
      // Two halves: an arc of SVG says nothing about a full turn.
      for (const end of [from + sweep / 2, from + sweep])
        put('A', radius, radius, 0, 0, 1, x + radius * Math.cos(end), y + radius * Math.sin(end))
    },
    closePath: () => void parts.push('Z'),
    data: () => parts.join(''),
  }
}
