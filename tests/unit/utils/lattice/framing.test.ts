import { describe, expect, it } from 'vitest'
import { bandWidth, padBox, viewOfBox, viewWithin } from '../../../../utils/lattice/framing'
import { rulerTicks } from '../../../../utils/lattice/ruler'
import { boxOfSegments } from '../../../../utils/lattice/segments'

describe('framing', () => {
  it('shows the whole box, centred, within the margin', () => {
    const view = viewOfBox({ x1: 10, y1: 20, x2: 30, y2: 24 }, 420, 300, 10)
    expect(view.scale).toBe(20)
    expect(view.x + 10 * view.scale).toBe(10)
    expect(view.x + 30 * view.scale).toBe(410)
    expect(view.y + 22 * view.scale).toBe(150)
    expect(viewOfBox({ x1: 1, y1: 1, x2: 1, y2: 1 }, 100, 100, 10, 30).scale).toBe(30)
  })

  it('shows a small machine whole where its chains would be drawn no larger', () => {
    const chains = { x1: 1, y1: 4, x2: 3, y2: 6 }
    const small = { x1: 0, y1: 0, x2: 11, y2: 11 }
    const view = viewWithin(chains, small, 420, 420, 10, 30)
    expect(view).toEqual({ scale: 30, x: 210 - 30 * 5.5, y: 210 - 30 * 5.5 })
    const large = { x1: 0, y1: 0, x2: 40, y2: 11 }
    expect(viewWithin(chains, large, 420, 420, 10, 30)).toEqual(viewOfBox(chains, 420, 420, 10, 30))
  })

  it('keeps bands of neighbouring lines apart from the moment they can be', () => {
    for (const scale of [8, 12, 20, 40, 64]) expect(bandWidth(scale)).toBeLessThan(scale)
    expect(bandWidth(0.1)).toBeGreaterThan(2)
  })

  it('finds the box around segments, all or some, and none around nothing', () => {
    const segments = Float32Array.of(0, 0, 4, 0, 2, -3, 2, 5)
    expect(boxOfSegments(segments)).toEqual({ x1: 0, y1: -3, x2: 4, y2: 5 })
    expect(boxOfSegments(segments, [0])).toEqual({ x1: 0, y1: 0, x2: 4, y2: 0 })
    expect(boxOfSegments(segments, [])).toBeNull()
    expect(padBox({ x1: 0, y1: 0, x2: 1, y2: 1 }, 2)).toEqual({ x1: -2, y1: -2, x2: 3, y2: 3 })
  })
})

describe('rulerTicks', () => {
  it('writes every twelfth line and marks the one between', () => {
    expect(rulerTicks(5, 10, 300, [0, 100])).toEqual([
      { line: 0, at: 5, text: '0' },
      { line: 6, at: 65, text: null },
      { line: 12, at: 125, text: '12' },
      { line: 18, at: 185, text: null },
      { line: 24, at: 245, text: '24' },
    ])
  })

  it('doubles the step until numbers have room, and stays within the lattice', () => {
    const ticks = rulerTicks(0, 1, 300, [0, 90])
    expect(ticks.filter(({ text }) => text).map(({ line }) => line)).toEqual([0, 48])
    expect(rulerTicks(100, 10, 300, [5, 90])[0]!.line).toBe(6)
  })
})
