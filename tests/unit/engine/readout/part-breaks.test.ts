import { describe, expect, it } from 'vitest'
import { programme } from '../../../../shared/engine/programming/programme'
import { breakStatistics } from '../../../../shared/engine/readout/breaks'
import { partBreaks } from '../../../../shared/engine/readout/part-breaks'
import { createRandom } from '../../../../shared/engine/random'
import { packRows } from '../../../../shared/engine/sampling/merge'
import { must, randomInstance, wideRanges } from '../programming/instances'

const usual = { ranges: wideRanges, fieldSplit: 'even', interactionCouplers: 'all', chainCouplers: 'all' } as const

function sampled(seed: number) {
  const instance = randomInstance(seed, { order: 40, sizes: [7, 6, 4, 3, 2, 1], density: 0.1, field: 1 })
  const programmed = must(programme({ ...usual, ...instance, strengths: new Float64Array(6).fill(1) }).programmed)
  const random = createRandom(seed)
  const rows = Array.from({ length: 150 }, () => {
    const state = Array.from({ length: 6 }, () => (random.float() < 0.5 ? 1 : -1))
    return Array.from(programmed.chainOf, (i) => (random.float() < 0.2 ? -state[i]! : state[i]!))
  })
  const counts = rows.map(() => 1 + random.below(4))
  return { programmed, rows, counts, samples: packRows(programmed.h.length, rows.flat(), counts) }
}

describe('partBreaks', () => {
  it.each([1, 2, 3, 4, 5])('equals a count on unpacked rows (seed %d)', (seed) => {
    const { programmed, rows, counts, samples } = sampled(seed)
    const { reads, qubits } = partBreaks(breakStatistics({ samples, programmed }), programmed)
    expect(reads).toBe(counts.reduce((a, b) => a + b, 0))
    const lengthOf = (i: number) => programmed.chainOf.filter((j) => j === i).length
    const long = Array.from(programmed.chainOf.keys()).filter((p) => lengthOf(programmed.chainOf[p]!) > 2)
    expect([...qubits.qubit]).toEqual(long.map((p) => programmed.qubits[p]))
    long.forEach((p, k) => {
      const own = Array.from(programmed.chainOf.keys()).filter((o) => programmed.chainOf[o] === programmed.chainOf[p])
      const minority = rows.reduce((sum, row, r) => {
        const alike = own.filter((o) => row[o] === row[p]).length
        return sum + (2 * alike < own.length ? counts[r]! : 0)
      }, 0)
      expect(qubits.breaks[k]).toBe(minority)
      expect(qubits.chain[k]).toBe(programmed.chainOf[p])
    })
  })

  it('counts couplers as the statistics of a return do, those inside chains only', () => {
    const { programmed, samples } = sampled(6)
    const { couplers } = partBreaks(breakStatistics({ samples, programmed }), programmed)
    const { perCoupler } = breakStatistics({ samples, programmed })
    const inside = Array.from(programmed.isChainCoupler.keys()).filter((c) => programmed.isChainCoupler[c])
    expect([...couplers.breaks]).toEqual(inside.map((c) => perCoupler[c]))
    expect([...couplers.ends]).toEqual(
      inside.flatMap((c) => [0, 1].map((end) => programmed.qubits[programmed.ends[2 * c + end]!])),
    )
  })

  it('leaves chains of two out of the qubits, as neither of the two is a majority', () => {
    const { programmed, samples } = sampled(7)
    const { qubits, couplers } = partBreaks(breakStatistics({ samples, programmed }), programmed)
    expect([...qubits.chain]).not.toContain(4)
    expect([...couplers.chain]).toContain(4)
  })

  it('refuses samples of another width', () => {
    const { programmed } = sampled(1)
    expect(() => partBreaks(breakStatistics({ samples: packRows(1, [1], [1]), programmed }), programmed)).toThrow(
      /samples of 1 qubits/,
    )
  })
})
