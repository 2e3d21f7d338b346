import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { createRandom } from '../../shared/engine/random'
import { lowestLevels } from '../../shared/engine/spectrum/lowest-levels'
import { spectrumOf } from '../../shared/engine/spectrum/spectrum'
import type { SpinModel } from '../../shared/engine/spectrum/spin-operator'
import { spinOperators } from '../../shared/engine/spectrum/spin-operator'

const model = (h: number[], pairs: [number, number][], J: number[]): SpinModel => ({
  h: Float64Array.from(h),
  ends: Uint32Array.from(pairs.flat()),
  J: Float64Array.from(J),
})

/** The lowest levels over all sectors. */
function levelsOf(spins: SpinModel, A: number, B: number, count: number): number[] {
  return spinOperators(spins)
    .flatMap((operator) => [...lowestLevels(operator, A / 2, B / 2, count, [], createRandom(1)).energies])
    .sort((a, b) => a - b)
    .slice(0, count)
}

const ring = (n: number): [number, number][] => Array.from({ length: n }, (_, i) => [i, (i + 1) % n])
const straight = { s: [0, 1], A: [8, 0], B: [0, 10] }
const watch = { cancelled: () => false, report: () => undefined }

describe('one spin', () => {
  it('has the gap √(A² + B²h²)', () => {
    for (const [A, B, h] of [
      [7, 0.3, 0.8],
      [2, 5, -0.4],
      [0, 9, 1],
    ] as const) {
      const [low, high] = levelsOf(model([h], [], []), A, B, 2)
      expect(high! - low!).toBeCloseTo(Math.hypot(A, B * h), 9)
      expect(low! + high!).toBeCloseTo(0, 9)
    }
  })

  it('has its least gap where the course of A and B says', () => {
    // A = 8(1 − s) and B = 10 s with h = 0.4: √(64(1 − s)² + 16 s²) is least at s = 0.8, where it is √12.8.
    const spectrum = spectrumOf(model([0.4], [], []), straight, { levels: 2, points: 8, seed: 1 }, watch)!
    expect(spectrum.gap!.s).toBeCloseTo(0.8, 3)
    expect(spectrum.gap!.gigahertz).toBeCloseTo(Math.sqrt(12.8), 6)
  })
})

describe('the ring in a transverse field (Pfeuty, Ann. Phys. 57:79, 1970)', () => {
  // H = −a Σ σx − b Σ σzσz: fermions of energy 2√(a² + b² − 2ab cos k); an even number of them stands on the momenta
  // (2m + 1)π/N, so the even ground energy is −Σ √(…) and the next even level has the two least energetic ones.
  const fermions = (N: number, a: number, b: number) =>
    Array.from(
      { length: N },
      (_, m) => 2 * Math.sqrt(a * a + b * b - 2 * a * b * Math.cos(((2 * m + 1) * Math.PI) / N)),
    )

  it.each([
    [4, 3, 1],
    [8, 1, 1],
    [10, 0.4, 2],
    [12, 2.5, 2],
  ])('N = %i, a = %f, b = %f', (N, a, b) => {
    const even = spinOperators(model(new Array<number>(N).fill(0), ring(N), new Array<number>(N).fill(-1))).find(
      ({ mirror }) => mirror === 1,
    )!
    const { energies } = lowestLevels(even, a, b, 2, [], createRandom(3))
    const modes = fermions(N, a, b).sort((one, other) => one - other)
    const ground = -modes.reduce((sum, mode) => sum + mode, 0) / 2
    expect(energies[0]).toBeCloseTo(ground, 8)
    expect(energies[1]).toBeCloseTo(ground + modes[0]! + modes[1]!, 8)
  })

  it('has as ground states at the end both ways to point alike, and a gap that counts both', () => {
    const chain = model(new Array<number>(6).fill(0), ring(6), new Array<number>(6).fill(-1))
    const spectrum = spectrumOf(chain, straight, { levels: 4, points: 41, seed: 1 }, watch)!
    expect(spectrum.groundStates).toBe(2)
    expect(spectrum.levels[1]![40]! - spectrum.levels[0]![40]!).toBeCloseTo(0, 8)
    expect(spectrum.gap!.gigahertz).toBeGreaterThan(1)
  })
})

describe('small models against full diagonalisation', () => {
  const { cases } = JSON.parse(readFileSync(new URL('../fixtures/spectrum-levels.json', import.meta.url), 'utf8')) as {
    cases: {
      h: number[]
      pairs: [number, number][]
      J: number[]
      points: { A: number; B: number; levels: number[] }[]
    }[]
  }

  it.each(cases.map((one) => [one.h.length, one] as const))(
    '%i spins (NumPy, eigvalsh)',
    (_, { h, pairs, J, points }) => {
      for (const { A, B, levels } of points) {
        const found = levelsOf(model(h, pairs, J), A, B, 6)
        levels.forEach((level, k) => expect(found[k]).toBeCloseTo(level, 8))
      }
    },
  )
})
