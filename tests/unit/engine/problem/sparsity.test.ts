import { describe, expect, it } from 'vitest'
import { cellOf, firstPlaceOf, pairsIn, sparsityOf } from '../../../../shared/engine/problem/sparsity'
import { createRandom } from '../../../../shared/engine/random'
import { randomProblem, smallInteger } from '../../../fixtures/problems/random-problem'

const BUDGET = 200_000

describe('sparsity', () => {
  it('counts every cell of the raster as a look at every pair does, in both orders', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const random = createRandom(seed)
      const n = 2 + random.below(40)
      const problem = randomProblem(random, n, random.float(), smallInteger)
      const bins = 1 + random.below(50)
      for (const order of ['given', 'banded'] as const) {
        const { raster, order: placed, bandwidth } = sparsityOf(problem, { order, bins, budget: BUDGET })
        expect(raster.bins).toBe(Math.min(bins, n))
        const interacting = new Set(Array.from(problem.rows, (row, k) => [row, problem.cols[k]!].sort().join()))
        const binAt = (place: number) => Math.floor((place * raster.bins) / n)
        let widest = 0
        const counts = new Map<string, number>()
        const pairs = new Map<string, number>()
        for (let a = 0; a < n; a++)
          for (let b = a + 1; b < n; b++) {
            const key = `${binAt(a)} ${binAt(b)}`
            const joined = interacting.has([placed[a]!, placed[b]!].sort().join())
            pairs.set(key, (pairs.get(key) ?? 0) + 1)
            counts.set(key, (counts.get(key) ?? 0) + Number(joined))
            if (joined) widest = Math.max(widest, b - a)
          }
        expect(bandwidth).toBe(widest)
        for (let p = 0; p < raster.bins; p++)
          for (let q = p; q < raster.bins; q++) {
            expect(raster.counts[cellOf(raster.bins, p, q)]).toBe(counts.get(`${p} ${q}`) ?? 0)
            expect(pairsIn(raster.bins, n, p, q)).toBe(pairs.get(`${p} ${q}`) ?? 0)
          }
      }
    }
  })

  it('counts interactions by distance, every one once', () => {
    const problem = randomProblem(createRandom(5), 30, 0.4, smallInteger)
    const { distances } = sparsityOf(problem, { order: 'given', bins: 30, budget: BUDGET })
    expect(distances.at(-1)!.to).toBe(29)
    for (const { from, to, count } of distances) {
      const within = Array.from(problem.rows).filter((row, k) => {
        const distance = problem.cols[k]! - row
        return distance >= from && distance <= to
      })
      expect(count).toBe(within.length)
    }
    expect(distances.reduce((sum, { count }) => sum + count, 0)).toBe(problem.values.length)
  })

  it('makes fewer bins where the counts would take more bytes than allowed', () => {
    const problem = randomProblem(createRandom(2), 300, 0.5, smallInteger)
    const { raster } = sparsityOf(problem, { order: 'given', bins: 300, budget: 5000 })
    expect(raster.counts.byteLength).toBeLessThanOrEqual(5000)
    expect(raster.bins).toBeGreaterThan(90)
    expect(Array.from(raster.counts).reduce((a, b) => a + b, 0)).toBe(problem.values.length)
  })

  it('holds for problems without variables or interactions', () => {
    const empty = {
      n: 0,
      linear: new Float64Array(0),
      rows: new Uint32Array(0),
      cols: new Uint32Array(0),
      values: new Float64Array(0),
      offset: 0,
    }
    expect(sparsityOf(empty, { order: 'banded', bins: 10, budget: 100 })).toMatchObject({ bandwidth: 0, distances: [] })
    expect(firstPlaceOf(3, 10, 3)).toBe(10)
  })
})
