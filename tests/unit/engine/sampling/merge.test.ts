import { describe, expect, it } from 'vitest'
import { firstEqualRows, joinSamples, mergeRows, packRows } from '../../../../shared/engine/sampling/merge'
import { spinOf } from '../../../../shared/engine/sampling/samples'
import { createRandom } from '../../../../shared/engine/random'

describe('packing and merging rows', () => {
  it('packs spins bit by bit', () => {
    const spins = Array.from({ length: 3 * 11 }, (_, k) => (k % 3 === 0 ? 1 : -1))
    const samples = packRows(11, spins, [1, 2, 3])
    expect(Array.from({ length: 33 }, (_, k) => spinOf(samples, Math.floor(k / 11), k % 11))).toEqual(spins)
    expect([...samples.counts]).toEqual([1, 2, 3])
    expect(samples.bytes.length).toBe(6)
  })

  it('merges equal rows in order of first appearance', () => {
    const random = createRandom(2)
    for (const width of [1, 4, 13]) {
      const spins = Array.from({ length: 300 * width }, () => (random.float() < 0.3 ? 1 : -1))
      const counts = Array.from({ length: 300 }, () => 1 + random.below(5))
      const expected = new Map<string, number>()
      counts.forEach((count, r) => {
        const key = spins.slice(r * width, (r + 1) * width).join()
        expected.set(key, (expected.get(key) ?? 0) + count)
      })
      const merged = mergeRows(packRows(width, spins, counts))
      const rows = Array.from({ length: merged.rows }, (_, r) =>
        Array.from({ length: width }, (_unused, c) => spinOf(merged, r, c)).join(),
      )
      expect(rows).toEqual([...expected.keys()])
      expect([...merged.counts]).toEqual([...expected.values()])
    }
  })

  it('takes no rows', () => {
    const none = packRows(5, [])
    expect(mergeRows(none)).toEqual(none)
    expect(firstEqualRows(none).length).toBe(0)
    expect(joinSamples([]).rows).toBe(0)
  })

  it('throws where lengths do not fit', () => {
    expect(() => packRows(2, [1, 1, 1])).toThrow(RangeError)
    expect(() => packRows(2, [1, 1], [1, 2])).toThrow(RangeError)
    expect(() => joinSamples([packRows(2, [1, 1]), packRows(1, [1])])).toThrow(RangeError)
  })
})
