import { describe, expect, it } from 'vitest'
import { energiesOfSweeps, STRAIGHT } from '../../../../shared/engine/sampling/anneal-path'
import { joinSamples } from '../../../../shared/engine/sampling/merge'
import { pathIntegralReads, pathWeights } from '../../../../shared/engine/sampling/path-integral'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'
import { physicalEnergy, statesOf } from '../programming/instances'
import { energiesOfRows } from './lattices'
import { randomModel } from './models'

const quiet = { cancelled: () => false, report: () => undefined }
const table = { s: [0, 0.4, 1], A: [6, 2, 0], B: [0.1, 4, 10] }
const options = { table, schedule: STRAIGHT, slices: 8, sweeps: 40, seed: 3, temperature: 0.3 }

describe('pathIntegralReads', () => {
  it('gives the same rows however the reads are split', () => {
    const model = samplerModel(randomModel(20, 1))
    const read = (firstRead: number, reads: number) => pathIntegralReads(model, { ...options, firstRead, reads }, quiet)
    expect(joinSamples([read(0, 3), read(3, 1), read(4, 5)])).toEqual(read(0, 9))
    expect(pathIntegralReads(model, { ...options, seed: 4, firstRead: 0, reads: 9 }, quiet)).not.toEqual(read(0, 9))
  })

  it('finds the ground state of small systems', () => {
    const list = randomModel(10, 2)
    const least = Math.min(...[...statesOf(10)].map((state) => physicalEnergy(list, state)))
    const samples = pathIntegralReads(samplerModel(list), { ...options, sweeps: 300, firstRead: 0, reads: 20 }, quiet)
    expect(Math.min(...energiesOfRows(list, samples))).toBeCloseTo(least, 10)
  })

  it('stops between sweeps and keeps the reads that are complete', () => {
    const model = samplerModel(randomModel(8, 2))
    const reports: number[] = []
    const control = {
      cancelled: () => reports.length >= 2,
      report: (progress: { readsDone: number }) => void reports.push(progress.readsDone),
    }
    expect(pathIntegralReads(model, { ...options, firstRead: 0, reads: 9 }, control).rows).toBe(2)
  })

  it.each([
    { slices: 1 },
    { slices: 257 },
    { slices: 2.5 },
    { sweeps: 0 },
    { temperature: 0 },
    { schedule: { t: [0], s: [0] } },
    { schedule: { t: [0, 0], s: [0, 1] } },
    { schedule: { t: [0, 1], s: [0, 1.1] } },
  ])('throws for %o', (wrong) => {
    const model = samplerModel(randomModel(3, 1))
    expect(() => pathIntegralReads(model, { ...options, ...wrong, firstRead: 0, reads: 1 }, quiet)).toThrow(RangeError)
  })
})

describe('the path of an anneal', () => {
  it('follows pauses and quenches, sweep by sweep', () => {
    const schedule = { t: [0, 4, 8, 10], s: [0, 0.4, 0.4, 1] }
    const { A, B } = energiesOfSweeps(schedule, table, 10)
    const at = [0.05, 0.15, 0.25, 0.35, 0.4, 0.4, 0.4, 0.4, 0.55, 0.85]
    const linear = (s: number, [a, b, c]: number[]) =>
      s <= 0.4 ? a! + (s / 0.4) * (b! - a!) : b! + ((s - 0.4) / 0.6) * (c! - b!)
    at.forEach((s, k) => {
      expect(A[k]).toBeCloseTo(linear(s, table.A), 12)
      expect(B[k]).toBeCloseTo(linear(s, table.B), 12)
    })
  })

  it('freezes slices together where A ends', () => {
    const { K, b } = pathWeights(0, 10, 16, 0.25)
    expect(K).toBe(16)
    expect(b).toBeCloseTo(10 / 8, 12)
    expect(pathWeights(4, 0, 8, 0.5).K).toBeCloseTo(-0.5 * Math.log(Math.tanh(0.5)), 12)
  })

  it('leaves a quenched state where it was: the populations of the pause before', () => {
    // One spin: after an instant quench the slices are as they were at the pause, whose exact polarisation is known.
    const model = samplerModel({ h: Float64Array.of(0.7), ends: new Uint32Array(0), J: new Float64Array(0) })
    const reads = 3000
    const schedule = { t: [0, 1, 100, 100.001], s: [0, 0.4, 0.4, 1] }
    const given = { ...options, schedule, slices: 24, sweeps: 100, temperature: 1, firstRead: 0, reads }
    const samples = pathIntegralReads(model, given, quiet)
    const energy = Math.hypot(2, 4 * 0.7) / 2
    const exact = (-(4 * 0.7) / 2 / energy) * Math.tanh(energy / 1)
    const mean = samples.bytes.reduce((sum, byte) => sum + (byte & 1 ? 1 : -1), 0) / reads
    expect(Math.abs(mean - exact)).toBeLessThan(4 / Math.sqrt(reads))
  })
})
