import { describe, expect, it } from 'vitest'
import { samplerModel, physicalModel } from '../../../../shared/engine/sampling/physical-model'
import { programme } from '../../../../shared/engine/programming/programme'
import { must, randomInstance, wideRanges } from '../programming/instances'

const instance = randomInstance(8, { order: 60, sizes: [12, 9, 9, 9, 9, 9], density: 0.1, field: 1 })
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(6).fill(2),
    ranges: wideRanges,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)

describe('physicalModel', () => {
  it('holds every coupling from both ends and every field', () => {
    const model = physicalModel(programmed)
    const matrix = Array.from({ length: model.n }, () => new Float64Array(model.n))
    programmed.J.forEach((J, c) => {
      matrix[programmed.ends[2 * c]!]![programmed.ends[2 * c + 1]!] = J
      matrix[programmed.ends[2 * c + 1]!]![programmed.ends[2 * c]!] = J
    })
    for (let i = 0; i < model.n; i++)
      for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) {
        expect(matrix[i]![model.targets[p]!]).toBe(model.weights[p])
        matrix[i]![model.targets[p]!] = 0
      }
    expect(matrix.every((row) => row.every((value) => value === 0))).toBe(true)
    expect(model.h).toEqual(programmed.h)
  })

  it('adds seeded control error of the given size, the same from both ends', () => {
    const error = { sigmaH: 0.1, sigmaJ: 0.2, seed: 4 }
    const model = physicalModel(programmed, error)
    expect(physicalModel(programmed, error)).toEqual(model)
    expect(physicalModel(programmed, { ...error, seed: 5 }).h).not.toEqual(model.h)
    const exact = physicalModel(programmed)
    const rms = (a: Float64Array, b: Float64Array): number =>
      Math.sqrt(a.reduce((sum, v, k) => sum + (v - b[k]!) ** 2, 0) / a.length)
    expect(Math.abs(rms(model.h, exact.h) / 0.1 - 1)).toBeLessThan(0.4)
    expect(Math.abs(rms(model.weights, exact.weights) / 0.2 - 1)).toBeLessThan(0.4)
    const seen = new Map<string, number>()
    for (let i = 0; i < model.n; i++)
      for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) {
        const key = [i, model.targets[p]!].sort((a, b) => a - b).join()
        if (seen.has(key)) expect(model.weights[p]).toBe(seen.get(key))
        else seen.set(key, model.weights[p]!)
      }
  })

  it('throws for couplings outside the spins and negative error', () => {
    const J = Float64Array.of(1)
    expect(() => samplerModel({ h: new Float64Array(2), ends: Uint32Array.of(0, 2), J })).toThrow(RangeError)
    expect(() => samplerModel({ h: new Float64Array(2), ends: Uint32Array.of(1, 1), J })).toThrow(RangeError)
    expect(() => physicalModel(programmed, { sigmaH: -1, sigmaJ: 0, seed: 1 })).toThrow(RangeError)
  })
})
