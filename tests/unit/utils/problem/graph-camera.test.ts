import { describe, expect, it } from 'vitest'
import {
  CAMERA_DEFAULTS,
  variableAtPixel,
  viewOfVariables,
  viewWithVariable,
  zoomedView,
} from '../../../../utils/problem/graph-camera'
import { boxOfVariables, framedPositions } from '../../../../utils/problem/graph-frame'
import { LINE_DEFAULTS, lookOfLines, paintLines } from '../../../../utils/problem/graph-lines'
import { stepWords, variableWords } from '../../../../utils/problem/graph-words'
import { readTokens } from '../../../../utils/lattice/tokens'

const viewport = { width: 600, height: 400 }
const pixel = ({ scale, x, y }: { scale: number; x: number; y: number }, positions: Float32Array, i: number) => [
  x + scale * positions[2 * i]!,
  y + scale * positions[2 * i + 1]!,
]

describe('framedPositions', () => {
  it('puts the middle at nought and the longer side from −1 to 1', () => {
    expect([...framedPositions(Float32Array.of(10, 5, 30, 5, 20, 15))]).toEqual([-1, -0.5, 1, -0.5, 0, 0.5])
    expect([...framedPositions(Float32Array.of(7, 7))]).toEqual([0, 0])
    expect(boxOfVariables(new Float32Array(0))).toEqual({ x1: -1, y1: -1, x2: 1, y2: 1 })
  })
})

describe('the camera', () => {
  const positions = Float32Array.of(-1, -0.5, 1, -0.5, 0, 0.5)

  it('shows all with room for labels', () => {
    const view = viewOfVariables(positions, viewport)
    for (let i = 0; i < 3; i++) {
      const [x, y] = pixel(view, positions, i)
      expect(x).toBeGreaterThanOrEqual(CAMERA_DEFAULTS.marginX - 1e-6)
      expect(x).toBeLessThanOrEqual(viewport.width - CAMERA_DEFAULTS.marginX + 1e-6)
      expect(y).toBeGreaterThanOrEqual(CAMERA_DEFAULTS.marginY - 1e-6)
      expect(y).toBeLessThanOrEqual(viewport.height - CAMERA_DEFAULTS.marginY + 1e-6)
    }
    expect(pixel(viewOfVariables(positions, viewport, [2]), positions, 2)).toEqual([300, 200])
  })

  it('zooms about the middle, and moves only for what is out of sight', () => {
    const view = viewOfVariables(positions, viewport)
    const closer = zoomedView(view, viewport, 4)
    const middle = [(300 - view.x) / view.scale, (200 - view.y) / view.scale] as const
    expect(closer.x + closer.scale * middle[0]).toBeCloseTo(300)
    expect(closer.y + closer.scale * middle[1]).toBeCloseTo(200)
    expect(viewWithVariable(view, viewport, positions, 0)).toBeNull()
    expect(pixel(viewWithVariable(closer, viewport, positions, 0)!, positions, 0)).toEqual([300, 200])
  })

  it('finds the variable under a pixel', () => {
    const view = viewOfVariables(positions, viewport)
    const [x, y] = pixel(view, positions, 1)
    expect(variableAtPixel(view, positions, x! + CAMERA_DEFAULTS.reach - 1, y!)).toBe(1)
    expect(variableAtPixel(view, positions, x! + CAMERA_DEFAULTS.reach + 1, y!)).toBe(-1)
  })
})

describe('lines', () => {
  const tokens = readTokens(() => '')

  it('shine through the more the more there are, and lose their dashes in a crowd', () => {
    const looks = [10, 1000, 20_000].map((lines) => lookOfLines(lines, tokens, 1))
    expect(looks[0]).toMatchObject({ opacity: 1, dashed: true, thickness: 1 })
    expect(looks[1]!.opacity).toBeLessThan(1)
    expect(looks[2]).toMatchObject({ opacity: LINE_DEFAULTS.leastOpacity, dashed: false })
  })

  it('are drawn from the weakest to the strongest, positive ones dashed, each once', () => {
    const drawn: { width: number; dashes: number; lines: number }[] = []
    let lines = 0
    let dashes = 0
    const ctx = {
      lineWidth: 0,
      setLineDash: (dash: number[]) => (dashes = dash.length),
      beginPath: () => (lines = 0),
      moveTo: () => undefined,
      lineTo: () => lines++,
      stroke: () => drawn.push({ width: ctx.lineWidth, dashes, lines }),
    }
    const input = {
      positions: new Float32Array(4),
      rows: new Uint32Array(400),
      cols: new Uint32Array(400).fill(1),
      steps: Int8Array.from({ length: 400 }, (_, k) => [2, -1, 1, -2][k % 4]!),
      scale: { bounds: [1, 2] },
      interactions: Array.from({ length: 400 }, (_, k) => k),
    }
    const look = lookOfLines(400, tokens, 1)
    const slices = [...paintLines(ctx as unknown as CanvasRenderingContext2D, input, { scale: 1, x: 0, y: 0 }, look)]
    expect(slices).toHaveLength(drawn.length)
    expect(drawn.reduce((sum, stroke) => sum + stroke.lines, 0)).toBe(400)
    const widths = drawn.map(({ width }) => width)
    expect(widths).toEqual([...widths].sort((a, b) => a - b))
    expect(drawn.filter((stroke) => stroke.dashes > 0).reduce((sum, stroke) => sum + stroke.lines, 0)).toBe(200)
  })
})

describe('words', () => {
  it('name the coefficients of a step', () => {
    const scale = { bounds: [2, 4, 6, 8] }
    expect([-4, -1, 0, 1, 4].map((step) => stepWords(scale, step))).toEqual([
      '−8 to −6',
      '−2 to 0',
      '0',
      '0 to 2',
      '6 to 8',
    ])
    expect([-1, 1].map((step) => stepWords({ bounds: [3] }, step))).toEqual(['−3', '+3'])
  })

  it('say what there is of a variable', () => {
    expect(variableWords('dun.2', 'ising', -3.5, 12)).toBe('dun.2: h = −3.5, 12 interactions')
    expect(variableWords('x', 'qubo', 0, 1)).toBe('x: a = 0, 1 interaction')
  })
})
