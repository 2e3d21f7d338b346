import { describe, expect, it } from 'vitest'
import { createRandom } from '../../../shared/engine/random'

const draw = (seed: number, stream?: number) => {
  const random = createRandom(seed, stream)
  return Array.from({ length: 8 }, () => random.uint32())
}

describe('the random source', () => {
  it('repeats itself for a seed and a stream, and for no other', () => {
    expect(draw(5, 2)).toEqual(draw(5, 2))
    expect(draw(5, 2)).not.toEqual(draw(5, 3))
    expect(draw(5, 2)).not.toEqual(draw(6, 2))
    expect(draw(2 ** 40)).not.toEqual(draw(0))
  })

  it('draws evenly below a bound', () => {
    const random = createRandom(1)
    const counts = new Array<number>(7).fill(0)
    for (let k = 0; k < 70_000; k++) counts[random.below(7)]!++
    // Chi-squared with 6 degrees of freedom exceeds 22.5 once in a thousand (standard tables).
    expect(counts.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0)).toBeLessThan(22.5)
  })

  it('draws deviates with mean 0, variance 1 and the kurtosis of a normal distribution', () => {
    const random = createRandom(3)
    const n = 200_000
    let [mean, square, fourth] = [0, 0, 0]
    for (let k = 0; k < n; k++) {
      const x = random.normal()
      mean += x / n
      square += (x * x) / n
      fourth += x ** 4 / n
    }
    expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(n))
    expect(Math.abs(square - 1)).toBeLessThan(4 * Math.sqrt(2 / n))
    expect(Math.abs(fourth - 3)).toBeLessThan(4 * Math.sqrt(96 / n))
  })

  it('draws floats in [0, 1) with all 53 bits', () => {
    const random = createRandom(9)
    const values = Array.from({ length: 1000 }, () => random.float())
    expect(values.every((v) => v >= 0 && v < 1)).toBe(true)
    expect(values.some((v) => (v * 2 ** 53) % 2 === 1)).toBe(true)
  })
})
