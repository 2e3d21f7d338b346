import { describe, expect, it } from 'vitest'
import { createRandom } from '../../../../shared/engine/random'
import { lowestLevels } from '../../../../shared/engine/spectrum/lowest-levels'
import { pausePlace } from '../../../../shared/engine/spectrum/pause'
import { spectrumOf } from '../../../../shared/engine/spectrum/spectrum'
import type { SpinModel } from '../../../../shared/engine/spectrum/spin-operator'
import { spinOperators } from '../../../../shared/engine/spectrum/spin-operator'

const model = (h: number[], pairs: [number, number][], J: number[]): SpinModel => ({
  h: Float64Array.from(h),
  ends: Uint32Array.from(pairs.flat()),
  J: Float64Array.from(J),
})
const table = { s: [0, 0.5, 1], A: [8, 2, 0], B: [0.2, 4, 11] }
const watch = { cancelled: () => false, report: () => undefined }
const options = { levels: 4, points: 21, seed: 1 }

describe('classical energies', () => {
  it('are those of the states, bit i for spin i', () => {
    const [operator] = spinOperators(
      model(
        [0.5, -1, 0.25],
        [
          [0, 2],
          [1, 2],
        ],
        [0.75, -0.5],
      ),
    )
    const energyOf = (k: number) => {
      const s = [0, 1, 2].map((i) => ((k >> i) & 1 ? 1 : -1))
      return 0.5 * s[0]! - s[1]! + 0.25 * s[2]! + 0.75 * s[0]! * s[2]! - 0.5 * s[1]! * s[2]!
    }
    expect([...operator!.classical]).toEqual(Array.from({ length: 8 }, (_, k) => energyOf(k)))
  })

  it('are halved into an even and an odd sector without fields', () => {
    const sectors = spinOperators(model([0, 0, 0], [[0, 1]], [1]))
    expect(sectors.map(({ mirror, size }) => [mirror, size])).toEqual([
      [1, 4],
      [-1, 4],
    ])
  })
})

describe('the spectrum', () => {
  const frustrated = model(
    [0.3, 0, -0.2, 0.1],
    [
      [0, 1],
      [1, 2],
      [2, 0],
      [2, 3],
    ],
    [1, 1, 1, -0.4],
  )

  it('is the same each time, and tells how far levels may be off', () => {
    const [one, other] = [
      spectrumOf(frustrated, table, options, watch)!,
      spectrumOf(frustrated, table, options, watch)!,
    ]
    expect(one).toEqual(other)
    expect(one.residual).toBeLessThan(1e-4)
    for (let p = 0; p < 21; p++)
      for (let k = 1; k < 4; k++) expect(one.levels[k]![p]!).toBeGreaterThanOrEqual(one.levels[k - 1]![p]!)
  })

  it('ends with the classical energies', () => {
    const { levels } = spectrumOf(frustrated, table, options, watch)!
    const classical = [...spinOperators(frustrated)[0]!.classical].sort((a, b) => a - b)
    for (let k = 0; k < 4; k++) expect(levels[k]![20]).toBeCloseTo((11 / 2) * classical[k]!, 6)
  })

  it('looks for the gap past all ground states, and says nothing where there are too many', () => {
    const triangle = model(
      [0, 0, 0],
      [
        [0, 1],
        [1, 2],
        [2, 0],
      ],
      [1, 1, 1],
    )
    const spectrum = spectrumOf(triangle, table, options, watch)!
    expect(spectrum.groundStates).toBe(6)
    expect(spectrum.levels).toHaveLength(7)
    expect(spectrum.gap!.course[20]).toBeCloseTo((11 / 2) * 4, 6)
    const free = spectrumOf(model([0, 0, 0, 0], [], []), table, options, watch)!
    expect([free.groundStates, free.gap]).toEqual([16, null])
  })

  it('finds the least gap between the points', () => {
    const coarse = spectrumOf(frustrated, table, { ...options, points: 9 }, watch)!
    const fine = spectrumOf(frustrated, table, { ...options, points: 401 }, watch)!
    expect(coarse.gap!.gigahertz).toBeCloseTo(fine.gap!.gigahertz, 5)
    expect(Math.min(...fine.gap!.course)).toBeGreaterThanOrEqual(coarse.gap!.gigahertz - 1e-6)
  })

  it('stops when it is cancelled, and refuses what it cannot work out', () => {
    expect(spectrumOf(frustrated, table, options, { ...watch, cancelled: () => true })).toBeNull()
    expect(() => spectrumOf(model(new Array<number>(15).fill(1), [], []), table, options, watch)).toThrow(/not 15/)
    expect(() => spectrumOf(model([1], [[0, 0]], [1]), table, options, watch)).toThrow(/joins spins 0 and 0/)
    expect(() => spectrumOf(model([Number.NaN], [], []), table, options, watch)).toThrow(/finite/)
    expect(() => spectrumOf(model([1], [], []), table, { ...options, levels: 1 }, watch)).toThrow(/levels/)
    expect(() => spectrumOf(model([1], [], []), table, { ...options, points: 1.5 }, watch)).toThrow(/points/)
  })
})

describe('the lowest levels', () => {
  it('are found where the start has everything but one of them', () => {
    const random = createRandom(4)
    const fields = Array.from({ length: 8 }, () => random.float() - 0.5)
    const ring = fields.map((_, i): [number, number] => [i, (i + 1) % 8])
    const [operator] = spinOperators(
      model(
        fields,
        ring,
        fields.map(() => random.float() - 0.5),
      ),
    )
    const { energies, vectors } = lowestLevels(operator!, 1, 4, 4, [], createRandom(1))
    const again = lowestLevels(operator!, 1, 4, 2, [vectors[0]!, vectors[2]!], createRandom(2))
    expect(again.energies[1]).toBeCloseTo(energies[1]!, 8)
  })
})

describe('where to pause', () => {
  const s = Float64Array.from([0, 0.25, 0.5, 0.75, 1])
  const gap = { s: 0.3, gigahertz: 0.1, course: Float64Array.from([8, 0.4, 0.5, 1.5, 9]) }

  it('is at the least gap where kT lies under it, else where the gap opens to kT again', () => {
    expect(pausePlace(gap, s, 0.05)).toBe(0.3)
    expect(pausePlace(gap, s, 1)).toBeCloseTo(0.625, 9)
    expect(pausePlace(gap, s, 0.3)).toBe(0.5)
    expect(pausePlace(gap, s, 20)).toBeNull()
  })
})

describe('levels that coincide', () => {
  // Without a problem at s = 0 the second level of n spins is n-fold, the third n(n − 1)/2-fold.
  const s = Array.from({ length: 21 }, (_, k) => k / 20)
  const ideal = { s, A: s.map((at) => 8 * (1 - at) ** 2), B: s.map((at) => 10 * at) }

  it.each([
    [5, 2],
    [6, 2],
    [6, 4],
    [7, 6],
    [8, 6],
  ])('of %i spins without couplings settle within their residual, the lowest %i', (n, levels) => {
    const h = Array.from({ length: n }, (_, i) => 0.11 * (i + 1) * (i % 2 === 0 ? 1 : -1))
    const found = spectrumOf(model(h, [], []), ideal, { levels, points: 13, seed: 1 }, watch)!
    found.s.forEach((at, p) => {
      const [A, B] = [8 * (1 - at) ** 2, 10 * at]
      // Each spin alone: ±√(A² + B²h²)/2; A between table points is interpolated there, so only those are compared.
      if (!s.some((point) => Math.abs(point - at) < 1e-12)) return
      const each = h.map((field) => Math.sqrt(A * A + B * B * field * field) / 2)
      const all = Array.from({ length: 1 << n }, (_, k) => each.reduce((sum, e, i) => sum + ((k >> i) & 1 ? e : -e), 0))
      all.sort((x, y) => x - y)
      for (let k = 0; k < levels; k++)
        expect(Math.abs(found.levels[k]![p]! - all[k]!)).toBeLessThan(Math.max(1e-6, found.residual))
    })
  })

  it.each([6, 7, 8, 9])('of %i spins with random couplings and no fields settle', (n) => {
    const random = createRandom(n)
    const pairs = Array.from({ length: n }, (_, i) =>
      Array.from({ length: i }, (_unused, j): [number, number] => [j, i]),
    ).flat()
    const couplings = pairs.map(() => 2 * random.float() - 1)
    const none = Array.from({ length: n }, () => 0)
    const found = spectrumOf(model(none, pairs, couplings), ideal, { levels: 4, points: 11, seed: 1 }, watch)!
    expect(found.residual).toBeLessThan(1e-2)
  })
})
