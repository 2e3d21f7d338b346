import { describe, expect, it } from 'vitest'
import {
  broughtIntoSight,
  centred,
  cornerBox,
  describeView,
  freestCorner,
  mapSize,
  revealing,
  seenBox,
  showsMost,
  zoomed,
} from '../../../../utils/lattice/camera-moves'
import { coverageOf, coveredIn } from '../../../../utils/lattice/coverage'

const extent = { width: 600, height: 400 }
const view = { scale: 10, x: -200, y: -100 }
const bounds = { x1: 0, y1: 0, x2: 100, y2: 100 }

/** The point of the lattice under a pixel. */
const under = ({ scale, x, y }: typeof view, px: number, py: number) => [(px - x) / scale, (py - y) / scale]

describe('zooming and centring', () => {
  it('keeps the point under the pointer, or the middle, where it is', () => {
    const [before, after] = [under(view, 120, 300), under(zoomed(view, 2.5, extent, { x: 120, y: 300 }), 120, 300)]
    expect(after[0]).toBeCloseTo(before[0]!, 10)
    expect(after[1]).toBeCloseTo(before[1]!, 10)
    expect(under(zoomed(view, 0.5, extent), 300, 200)).toEqual(under(view, 300, 200))
  })

  it('puts a point into the middle', () => {
    expect(under(centred(view, extent, { x: 7, y: 9 }), 300, 200)).toEqual([7, 9])
    expect(seenBox(view, extent)).toEqual({ x1: 20, y1: 10, x2: 80, y2: 50 })
  })
})

describe('bringing into sight', () => {
  it('leaves alone what is in sight in part, and centres the rest without zooming', () => {
    const [inSight, away] = [
      { x1: 22, y1: 30, x2: 0, y2: 30 },
      { x1: 94, y1: 60, x2: 90, y2: 60 },
    ]
    expect(broughtIntoSight(view, extent, [away, inSight])).toBeNull()
    const moved = broughtIntoSight(view, extent, [away, { x1: 90, y1: 60, x2: 90, y2: 70 }])!
    expect(moved.scale).toBe(10)
    expect(under(moved, 300, 200)).toEqual([92, 65])
    // The box around both parts reaches through the viewport, yet neither is in it.
    const corner = [
      { x1: 0, y1: 60, x2: 90, y2: 60 },
      { x1: 90, y1: 0, x2: 90, y2: 60 },
    ]
    expect(broughtIntoSight(view, extent, corner)).not.toBeNull()
    expect(broughtIntoSight(view, extent, [])).toBeNull()
  })

  it('reveals all of a box: still where it is seen already, nearer where it is small, farther where it is large', () => {
    const near = { scale: 20, x: 0, y: 0 }
    expect(revealing(near, extent, { x1: 2, y1: 2, x2: 8, y2: 8 })).toEqual(near)
    expect(revealing({ scale: 2, x: 0, y: 0 }, extent, { x1: 2, y1: 2, x2: 8, y2: 8 }).scale).toBe(14)
    const large = revealing(near, extent, { x1: 0, y1: 0, x2: 90, y2: 90 })
    const seen = seenBox(large, extent)
    expect(seen.x1).toBeLessThan(0)
    expect(seen.y2).toBeGreaterThan(90)
  })
})

describe('the map of the machine', () => {
  it('is needed while a good part of the machine is out of view', () => {
    expect(showsMost(view, extent, bounds)).toBe(false)
    expect(showsMost({ scale: 3.9, x: 10, y: 5 }, extent, bounds)).toBe(true)
  })

  it('keeps the shape of the machine', () => {
    expect(mapSize({ x1: 0, y1: 0, x2: 200, y2: 50 }, 100)).toEqual({ scale: 0.5, width: 100, height: 25 })
  })

  it('takes the corner that hides the fewest bands, the lower right one among equals', () => {
    const size = { width: 100, height: 100 }
    expect(freestCorner(view, extent, size, () => 0)).toBe('bottom right')
    // All but the upper left corner of what is in view, lines 20 … 80 by 10 … 50, is crossed by bands.
    const bands = Array.from({ length: 40 }, (_, i) => ({
      chain: 0,
      qubits: [],
      x1: 40,
      y1: 11 + i,
      x2: 80,
      y2: 11 + i,
    }))
    bands.push(
      ...Array.from({ length: 8 }, (_, i) => ({ chain: 0, qubits: [], x1: 20, y1: 42 + i, x2: 40, y2: 42 + i })),
    )
    const coverage = coverageOf(bands, bounds)
    expect(freestCorner(view, extent, size, (box) => coveredIn(coverage, box))).toBe('top left')
    expect(cornerBox('top right', extent, size)).toEqual({ x1: 500, y1: 0, x2: 600, y2: 100 })
  })
})

describe('what is in view, in words', () => {
  it('names the lines, within the machine', () => {
    expect(describeView(view, extent, bounds)).toBe('In view: lines 20 to 80 across, 10 to 50 down.')
    expect(describeView({ scale: 5, x: 50, y: 50 }, extent, bounds)).toBe(
      'In view: lines 0 to 100 across, 0 to 70 down.',
    )
    expect(describeView({ scale: 3.5, x: 30, y: 20 }, extent, bounds)).toBe('Whole machine in view.')
  })
})
