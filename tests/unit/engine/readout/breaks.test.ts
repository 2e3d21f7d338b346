import { describe, expect, it } from 'vitest'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { programme } from '../../../../shared/engine/programming/programme'
import { breakStatistics } from '../../../../shared/engine/readout/breaks'
import { createRandom } from '../../../../shared/engine/random'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { isingOf, must, randomInstance, wideRanges } from '../programming/instances'

const usual = { ranges: wideRanges, fieldSplit: 'even', interactionCouplers: 'all', chainCouplers: 'all' } as const

describe('breakStatistics', () => {
  it('counts broken chains by hand', () => {
    const machine = graphFromEdges(6, [0, 1, 1, 2, 2, 3, 3, 4, 4, 5])
    const programmed = must(
      programme({
        ...usual,
        machine,
        embedding: packChains([[0, 1, 2], [3, 4], [5]]),
        ising: isingOf(
          [0, 0, 0],
          [
            [0, 1, 1],
            [1, 2, 1],
          ],
        ),
        strengths: Float64Array.of(1, 1, 1),
      }).programmed,
    )
    const samples = packRows(6, [1, 1, 1, -1, -1, 1, 1, -1, 1, -1, -1, 1, 1, 1, -1, -1, 1, -1], [5, 2, 1])
    const statistics = breakStatistics({ samples, programmed })
    expect(statistics.reads).toBe(8)
    expect([...statistics.perChain.breaks]).toEqual([3, 1, 0])
    expect([...statistics.perRead.brokenChains]).toEqual([0, 1, 2])
    expect(statistics.perRead.histogram).toEqual([5, 2, 1])
    // Couplers 0-1, 1-2, 2-3 (interaction), 3-4, 4-5 (interaction).
    expect([...statistics.perCoupler]).toEqual([2, 3, 0, 1, 0])
    expect(statistics.readsWithBreak).toBe(3)
    expect(statistics.chainReads).toBe(16)
  })

  it('equals a count on unpacked rows', () => {
    const instance = randomInstance(4, { order: 30, sizes: [6, 5, 4, 3, 2, 1], density: 0.1, field: 1 })
    const programmed = must(programme({ ...usual, ...instance, strengths: new Float64Array(6).fill(1) }).programmed)
    const random = createRandom(1)
    const width = programmed.h.length
    const rows = Array.from({ length: 200 }, () => {
      const state = Array.from({ length: 6 }, () => (random.float() < 0.5 ? 1 : -1))
      return Array.from(programmed.chainOf, (i) => (random.float() < 0.05 ? -state[i]! : state[i]!))
    })
    const counts = rows.map(() => 1 + random.below(3))
    const statistics = breakStatistics({ samples: packRows(width, rows.flat(), counts), programmed })
    const broken = rows.map((row) =>
      [0, 1, 2, 3, 4, 5].map((i) => new Set(row.filter((_, p) => programmed.chainOf[p] === i)).size > 1),
    )
    const weigh = (test: (r: number) => boolean): number =>
      counts.reduce((sum, count, r) => sum + (test(r) ? count : 0), 0)
    expect([...statistics.perChain.breaks]).toEqual([0, 1, 2, 3, 4, 5].map((i) => weigh((r) => broken[r]![i]!)))
    expect(statistics.readsWithBreak).toBe(weigh((r) => broken[r]!.includes(true)))
    programmed.isChainCoupler.forEach((inside, c) => {
      const [a, b] = [programmed.ends[2 * c]!, programmed.ends[2 * c + 1]!]
      expect(statistics.perCoupler[c]).toBe(inside ? weigh((r) => rows[r]![a] !== rows[r]![b]) : 0)
    })
    expect(statistics.perRead.histogram.reduce((a, b) => a + b)).toBe(statistics.reads)
  })

  it('throws for samples of another width', () => {
    const instance = randomInstance(4, { order: 10, sizes: [2, 1], density: 0.1, field: 1 })
    const programmed = must(programme({ ...usual, ...instance, strengths: new Float64Array(2) }).programmed)
    expect(() => breakStatistics({ samples: packRows(2, [1, 1]), programmed })).toThrow(RangeError)
  })
})
