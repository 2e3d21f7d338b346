import { describe, expect, it } from 'vitest'
import { programme } from '../../../../shared/engine/programming/programme'
import type { Programmed } from '../../../../shared/engine/programming/programme'
import { chainPulls, NO_PULL } from '../../../../shared/engine/readout/pulls'
import { must, randomInstance, wideRanges } from '../programming/instances'

const usual = { ranges: wideRanges, fieldSplit: 'even', interactionCouplers: 'all' } as const

/** Positions reached from `from` inside its chain without the coupler `without`. */
function reached({ chainOf, ends, isChainCoupler }: Programmed, from: number, without: number): Set<number> {
  const seen = new Set([from])
  for (let grown = true; grown;) {
    grown = false
    isChainCoupler.forEach((inside, c) => {
      if (!inside || c === without || chainOf[ends[2 * c]!] !== chainOf[from]) return
      const [a, b] = [ends[2 * c]!, ends[2 * c + 1]!]
      if (seen.has(a) === seen.has(b)) return
      seen.add(a).add(b)
      grown = true
    })
  }
  return seen
}

/** Straight from the definition: takes every coupler out and looks at both sides. */
function pullsByDefinition(programmed: Programmed): { couplers: number[]; qubits: number[] } {
  const { chainOf, ends, isChainCoupler, J, h } = programmed
  const couplers = Array.from(J, () => NO_PULL)
  const qubits = Array.from(chainOf, () => NO_PULL)
  const side = (set: Set<number>, field: 1 | -1): number => {
    let sum = 0
    for (const p of set) {
      sum += field * h[p]!
      for (let c = 0; c < J.length; c++)
        if (!isChainCoupler[c] && (ends[2 * c] === p || ends[2 * c + 1] === p)) sum += Math.abs(J[c]!)
    }
    return sum
  }
  for (let c = 0; c < J.length; c++) {
    if (!isChainCoupler[c]) continue
    const S = reached(programmed, ends[2 * c]!, c)
    const R = reached(programmed, ends[2 * c + 1]!, c)
    if (S.has(ends[2 * c + 1]!)) continue
    const worst = Math.max(Math.min(side(S, -1), side(R, 1)), Math.min(side(S, 1), side(R, -1)))
    couplers[c] = Math.max(0, worst) / Math.abs(J[c]!)
    const lesser = S.size < R.size ? S : S.size > R.size ? R : new Set<number>()
    for (const p of lesser) qubits[p] = Math.max(qubits[p]!, couplers[c]!)
  }
  return { couplers, qubits }
}

describe('chainPulls', () => {
  it.each(Array.from({ length: 40 }, (_, k) => k + 1))('equals both sides looked at one by one (seed %d)', (seed) => {
    const density = seed % 2 ? 0.08 : 0.25
    const instance = randomInstance(seed, { order: 40, sizes: [9, 8, 5, 4, 3, 2, 1], density, field: seed % 3 })
    const strengths = Float64Array.from({ length: 7 }, (_, i) => 1 + i / 4)
    const chainCouplers = seed % 4 === 0 ? 'spanning tree' : 'all'
    const programmed = must(programme({ ...usual, ...instance, chainCouplers, strengths }).programmed)
    const pulls = chainPulls(programmed)
    const expected = pullsByDefinition(programmed)
    expected.couplers.forEach((pull, c) => expect(pulls.couplers[c]).toBeCloseTo(pull, 4))
    expected.qubits.forEach((pull, p) => expect(pulls.qubits[p]).toBeCloseTo(pull, 4))
  })
})
