import { describe, expect, it } from 'vitest'
import { effectiveTemperature } from '../../../../shared/engine/readout/temperature'
import { createRandom } from '../../../../shared/engine/random'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'
import { physicalEnergy, statesOf } from '../programming/instances'

const random = createRandom(21)
const list = {
  h: Float64Array.from({ length: 6 }, () => random.normal() * 0.4),
  ends: Uint32Array.from([0, 1, 1, 2, 2, 3, 3, 4, 4, 5, 0, 5, 0, 3]),
  J: Float64Array.from({ length: 7 }, () => random.normal()),
}
const model = samplerModel(list)
const states = [...statesOf(6)]

/** Independent draws by inversion of the exact distribution. */
function drawExactly(beta: number, reads: number): number[][] {
  const weights = states.map((state) => Math.exp(-beta * physicalEnergy(list, state)))
  const total = weights.reduce((a, b) => a + b)
  return Array.from({ length: reads }, () => {
    let rest = random.float() * total
    return states[
      Math.max(
        0,
        weights.findIndex((weight) => (rest -= weight) < 0),
      )
    ]!
  })
}

describe('effectiveTemperature', () => {
  it.each([0.3, 1, 2, -0.5])('finds the inverse temperature of exact draws (β = %d)', (beta) => {
    const rows = drawExactly(beta, 4000)
    const estimate = effectiveTemperature(model, packRows(6, rows.flat()))!
    expect(Math.abs(estimate.inverseTemperature - beta)).toBeLessThan(4 * estimate.standardError!)
    expect(estimate.standardError!).toBeLessThan(0.1)
    expect(estimate.temperature).toBeCloseTo(1 / estimate.inverseTemperature, 12)
  })

  it('maximises the pseudo-likelihood, by direct evaluation', () => {
    const rows = drawExactly(1, 300)
    const logLikelihood = (beta: number): number =>
      rows.reduce((sum, row) => {
        for (let i = 0; i < 6; i++) {
          const flipped = row.map((s, j) => (i === j ? -s : s))
          sum -= Math.log1p(Math.exp(-beta * (physicalEnergy(list, flipped) - physicalEnergy(list, row))))
        }
        return sum
      }, 0)
    const { inverseTemperature } = effectiveTemperature(model, packRows(6, rows.flat()))!
    const best = logLikelihood(inverseTemperature)
    for (const step of [-0.02, 0.02]) expect(logLikelihood(inverseTemperature + step)).toBeLessThan(best)
  })

  it('scales its error with the spread over rows, and not with rows split by count', () => {
    const rows = drawExactly(1, 200)
    const twice = effectiveTemperature(
      model,
      packRows(
        6,
        rows.flat(),
        rows.map(() => 2),
      ),
    )!
    const repeated = effectiveTemperature(model, packRows(6, [...rows, ...rows].flat()))!
    expect(twice.inverseTemperature).toBeCloseTo(repeated.inverseTemperature, 8)
    expect(twice.standardError).toBeCloseTo(repeated.standardError!, 8)
  })

  it('leaves rows out by lot where they are too many, the same ones for a seed', () => {
    const samples = packRows(6, drawExactly(1, 2000).flat())
    const options = { mostSpins: 6 * 500, seed: 4 }
    const drawn = effectiveTemperature(model, samples, options)!
    expect(drawn.rows).toBe(500)
    expect(effectiveTemperature(model, samples, options)).toEqual(drawn)
    expect(effectiveTemperature(model, samples, { ...options, seed: 5 })).not.toEqual(drawn)
    expect(Math.abs(drawn.inverseTemperature - 1)).toBeLessThan(4 * drawn.standardError!)
    const all = effectiveTemperature(model, samples)!
    expect(all.rows).toBe(2000)
    expect(drawn.standardError! / all.standardError!).toBeCloseTo(2, 0)
  })

  it('looks at the rows it is given only', () => {
    const rows = [...drawExactly(2, 300), ...drawExactly(0.3, 300)]
    const half = effectiveTemperature(model, packRows(6, rows.slice(300).flat()))
    const chosen = Uint32Array.from({ length: 300 }, (_, k) => 300 + k)
    expect(effectiveTemperature(model, packRows(6, rows.flat()), { rows: chosen })).toEqual(half)
  })

  it('says when there is nothing to learn', () => {
    expect(effectiveTemperature(model, packRows(6, []))).toBeNull()
    const free = samplerModel({ h: new Float64Array(2), ends: new Uint32Array(0), J: new Float64Array(0) })
    expect(effectiveTemperature(free, packRows(2, [1, 1]))).toBeNull()
    const held = samplerModel({ h: Float64Array.of(1), ends: new Uint32Array(0), J: new Float64Array(0) })
    expect(effectiveTemperature(held, packRows(1, [-1]))).toMatchObject({
      inverseTemperature: Infinity,
      temperature: 0,
    })
    expect(effectiveTemperature(held, packRows(1, [1]))).toMatchObject({ inverseTemperature: -Infinity })
    expect(() => effectiveTemperature(model, packRows(1, [1]))).toThrow(RangeError)
  })
})
