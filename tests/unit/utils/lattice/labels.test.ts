import { describe, expect, it } from 'vitest'
import { coverageOf, coveredIn } from '../../../../utils/lattice/coverage'
import { placeTags, spotsOf } from '../../../../utils/lattice/labels'
import type { TagRequest } from '../../../../utils/lattice/labels'
import { seeded } from './small-lattice'

const view = { scale: 10, x: 0, y: 0 }
const viewport = { x1: 0, y1: 0, x2: 600, y2: 500 }
const request = (key: number, band: { x1: number; y1: number; x2: number; y2: number }, more = {}): TagRequest => ({
  key,
  priority: 1,
  width: 40,
  height: 15,
  spots: spotsOf(band),
  insist: false,
  ...more,
})

describe('placeTags', () => {
  it('never lets two tags touch, nor one leave the viewport', () => {
    const random = seeded(2)
    const requests = Array.from({ length: 150 }, (_, key) => {
      const x = random() * 60
      const y = random() * 50
      const band = random() < 0.5 ? { x1: x, y1: y, x2: x + 12, y2: y } : { x1: x, y1: y, x2: x, y2: y + 12 }
      return request(key, band, { priority: random() })
    })
    const placed = placeTags(requests, view, viewport, null, [], { gap: 3, tolerance: 17, most: 150, share: 1 })
    expect(placed.length).toBeGreaterThan(60)
    placed.forEach(({ box: a }, i) => {
      expect(Math.min(a.x1, a.y1)).toBeGreaterThanOrEqual(0)
      expect(a.x2).toBeLessThanOrEqual(600)
      expect(a.y2).toBeLessThanOrEqual(500)
      for (const { box: b } of placed.slice(i + 1))
        expect(a.x1 >= b.x2 || b.x1 >= a.x2 || a.y1 >= b.y2 || b.y1 >= a.y2).toBe(true)
    })
  })

  it('serves higher priority first and keeps clear of held boxes', () => {
    const band = { x1: 10, y1: 10, x2: 10.1, y2: 10 }
    const spot = [{ x: 10, y: 10, ox: 0, oy: 0, room: Infinity }]
    const two = [request(0, band, { spots: spot }), request(1, band, { spots: spot, priority: 2 })]
    expect(placeTags(two, view, viewport, null).map(({ key }) => key)).toEqual([1])
    expect(placeTags(two, view, viewport, null, [{ x1: 90, y1: 90, x2: 110, y2: 110 }])).toEqual([])
  })

  it('leaves out a tag that would hide too many bands, unless it insists', () => {
    const bands = Array.from({ length: 30 }, (_, i) => ({ chain: i, qubits: [], x1: 0, y1: i, x2: 60, y2: i }))
    const coverage = coverageOf(bands, { x1: 0, y1: 0, x2: 60, y2: 30 })
    const crowded = request(0, { x1: 20, y1: 15, x2: 32, y2: 15 }, { width: 60, height: 40 })
    const strict = { gap: 3, tolerance: 10, most: 90, share: 1 }
    expect(placeTags([crowded], view, viewport, coverage, [], strict)).toEqual([])
    expect(placeTags([{ ...crowded, insist: true }], view, viewport, coverage, [], strict)).toHaveLength(1)
  })

  it('covers no more than a share of the viewport, but for tags that insist', () => {
    const requests = Array.from({ length: 80 }, (_, key) => {
      const [x, y] = [3 + 6 * (key % 9), 3 + 5 * Math.floor(key / 9)]
      return request(key, { x1: x, y1: y, x2: x, y2: y }, { priority: -key })
    })
    const share = { gap: 3, tolerance: 17, most: 150, share: 0.05 }
    const placed = placeTags(requests, view, viewport, null, [], share)
    expect(placed.map(({ key }) => key)).toEqual(
      Array.from({ length: (0.05 * 600 * 500) / (40 * 15) }, (_, key) => key),
    )
    const insisting = requests.map((one) => ({ ...one, insist: true }))
    expect(placeTags(insisting, view, viewport, null, [], share).length).toBeGreaterThan(60)
  })

  it('sets a tag beside a band too short to carry it', () => {
    const [placed] = placeTags([request(0, { x1: 20, y1: 20, x2: 22, y2: 20 })], view, viewport, null)
    expect(placed!.box.x2 <= 200 || placed!.box.x1 >= 220).toBe(true)
  })

  it('sets the tag of a disc above or below it where both neighbours in its row are chains', () => {
    const wide = { scale: 30, x: 0, y: 0 }
    const discs = [9, 10, 11].map((x, chain) => ({ chain, qubits: [], x1: x - 0.3, y1: 10, x2: x + 0.3, y2: 10 }))
    const coverage = coverageOf(discs, { x1: 0, y1: 0, x2: 20, y2: 20 })
    const [placed] = placeTags([request(1, discs[1]!, { width: 15 })], wide, viewport, coverage)
    expect(Math.abs(placed!.box.y1 + placed!.box.y2 - 600) / 2).toBeGreaterThan(15)
    expect((placed!.box.x1 + placed!.box.x2) / 2).toBeCloseTo(300)
  })
})

describe('coverage', () => {
  it('counts cells as a plain count does', () => {
    const random = seeded(9)
    const bands = Array.from({ length: 25 }, (_, chain) => {
      const x = Math.floor(random() * 20)
      const y = Math.floor(random() * 20)
      const length = Math.floor(random() * 8)
      const isLevel = random() < 0.5
      return { chain, qubits: [], x1: x, y1: y, x2: isLevel ? x + length : x, y2: isLevel ? y : y + length }
    })
    const coverage = coverageOf(bands, { x1: 0, y1: 0, x2: 30, y2: 30 })
    for (let k = 0; k < 40; k++) {
      const x1 = Math.floor(random() * 20)
      const y1 = Math.floor(random() * 20)
      const box = { x1, y1, x2: x1 + Math.floor(random() * 8), y2: y1 + Math.floor(random() * 8) }
      let expected = 0
      for (const band of bands)
        for (let x = band.x1; x <= band.x2; x++)
          for (let y = band.y1; y <= band.y2; y++)
            if (x >= box.x1 && x <= box.x2 && y >= box.y1 && y <= box.y2) expected++
      expect(coveredIn(coverage, box)).toBe(expected)
    }
  })
})
