import { describe, expect, it } from 'vitest'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { programme } from '../../../../shared/engine/programming/programme'
import type { ProgrammeInput } from '../../../../shared/engine/programming/programme'
import { isingOf, logicalEnergy, must, physicalEnergy, randomInstance, statesOf, wideRanges } from './instances'

const tight = { h: [-0.7, 0.9], J: [-1.5, 0.8], couplingSum: [-2.2, 3] } as const

const inputs = (seed: number): ProgrammeInput[] => {
  const instance = randomInstance(seed, { order: 18, sizes: [4, 1, 3, 2, 5], density: 0.2, field: 1.5 })
  const strengths = Float64Array.from([1, 0.25, 2.5, 0, 1.75])
  return (['even', 'external coupling'] as const).flatMap((fieldSplit) =>
    (['all', 'one'] as const).flatMap((interactionCouplers) =>
      (['all', 'spanning tree'] as const).flatMap((chainCouplers) =>
        [tight, wideRanges].map((ranges) => ({
          ...instance,
          strengths,
          fieldSplit,
          interactionCouplers,
          chainCouplers,
          ranges,
        })),
      ),
    ),
  )
}

describe('programme', () => {
  it.each([1, 2, 3, 4, 5])('keeps scale·E_logical = E_physical + offset on all unbroken states (seed %i)', (seed) => {
    for (const input of inputs(seed)) {
      const programmed = must(programme(input).programmed)
      for (const state of statesOf(input.ising.n)) {
        const physical = Array.from(programmed.chainOf, (i) => state[i]!)
        const left = programmed.scale * logicalEnergy(input.ising, state)
        expect(left).toBeCloseTo(physicalEnergy(programmed, physical) + programmed.offset, 10)
      }
    }
  })

  it.each([1, 2, 3])('uses the largest scale up to 1 that fits every range (seed %i)', (seed) => {
    for (const input of inputs(seed)) {
      const programmed = must(programme(input).programmed)
      const sums = new Float64Array(programmed.h.length)
      programmed.J.forEach((J, c) => {
        sums[programmed.ends[2 * c]!]! += J
        sums[programmed.ends[2 * c + 1]!]! += J
      })
      const worst = (values: Float64Array, range: readonly [number, number] | null): number =>
        range ? Math.max(0, ...Array.from(values, (v) => (v > 0 ? v / range[1] : v / range[0]))) : 0
      const loads = [
        worst(programmed.h, input.ranges.h),
        worst(programmed.J, input.ranges.J),
        worst(sums, input.ranges.couplingSum),
      ]
      expect(Math.max(...loads)).toBeLessThanOrEqual(1)
      if (programmed.scale < 1) {
        expect(Math.max(...loads)).toBeCloseTo(1, 12)
        expect(['h', 'J', 'coupling sum'][loads.indexOf(Math.max(...loads))]).toBe(programmed.limitedBy)
      } else expect(programmed.limitedBy).toBe('nothing')
    }
  })

  it('programmes a hand-computed triangle on a square', () => {
    // Variable 0 on qubits 0 and 2; qubits 1 and 3 are variables 1 and 2. Couplers 0-1, 1-2, 2-3, 0-3, 0-2 and 1-3.
    const machine = graphFromEdges(4, [0, 1, 1, 2, 2, 3, 0, 3, 0, 2, 1, 3])
    const input: ProgrammeInput = {
      machine,
      embedding: packChains([[2, 0], [1], [3]]),
      ising: isingOf(
        [1, 0, -0.5],
        [
          [0, 1, 2],
          [0, 2, -1],
          [1, 2, 4],
        ],
        3,
      ),
      strengths: Float64Array.of(3, 0, 0),
      fieldSplit: 'even',
      interactionCouplers: 'all',
      chainCouplers: 'all',
      ranges: { h: [-4, 4], J: [-2, 1], couplingSum: null },
    }
    const programmed = must(programme(input).programmed)
    expect(programmed.scale).toBe(0.25)
    expect(programmed.limitedBy).toBe('J')
    expect([...programmed.qubits]).toEqual([0, 1, 2, 3])
    expect([...programmed.h]).toEqual([0.125, 0, 0.125, -0.125])
    expect([...programmed.ends]).toEqual([0, 1, 0, 2, 0, 3, 1, 2, 1, 3, 2, 3])
    expect([...programmed.J]).toEqual([0.25, -0.75, -0.125, 0.25, 1, -0.125])
    expect([...programmed.isChainCoupler]).toEqual([0, 1, 0, 0, 0, 0])
    expect(programmed.offset).toBe(0.25 * (3 + 3))
  })

  it('gives the same bytes for the same input', () => {
    const [input] = inputs(9)
    expect(programme(input!)).toEqual(programme({ ...input! }))
  })

  it('refuses a chosen scale that leaves a range, and says which values', () => {
    const [input] = inputs(1)
    const fitted = must(programme(input!).programmed)
    expect(programme({ ...input!, scale: fitted.scale }).excesses).toBeNull()
    const refused = programme({ ...input!, scale: 4 })
    expect(refused.programmed).toBeNull()
    expect(refused.excesses!.map((e) => e.range)).toContain('J')
    for (const excess of refused.excesses!) {
      expect(excess.count).toBeGreaterThan(0)
      expect(excess.first.length).toBeGreaterThan(0)
      expect(excess.least < excess.limits[0] || excess.greatest > excess.limits[1]).toBe(true)
    }
  })

  it('takes a chosen scale above 1 where it fits', () => {
    const input = { ...inputs(1)[1]!, scale: 2 }
    expect(must(programme(input).programmed).scale).toBe(2)
  })

  it('refuses when no scale fits', () => {
    const input = { ...inputs(1)[0]!, ranges: { h: [-1, 1], J: [0, 1], couplingSum: null } as const }
    expect(programme(input).programmed).toBeNull()
  })

  it('throws for what a caller must not pass', () => {
    const [input] = inputs(1)
    const machine = graphFromEdges(3, [0, 1, 1, 2])
    const ising = isingOf([0, 0], [[0, 1, 1]])
    const bare = { ...input!, machine, ising, strengths: new Float64Array(2) }
    expect(() => programme({ ...bare, embedding: packChains([[0], [2]]) })).toThrow(/no coupler joins/)
    expect(() => programme({ ...bare, embedding: packChains([[0, 2], [1]]) })).toThrow(/not connected/)
    expect(() => programme({ ...bare, embedding: packChains([[0, 1], [1]]) })).toThrow(/used by variables/)
    expect(() => programme({ ...bare, embedding: packChains([[0], []]) })).toThrow(/no qubit/)
    expect(() => programme({ ...bare, embedding: packChains([[0], [3]]) })).toThrow(/not on the machine/)
    expect(() => programme({ ...bare, embedding: packChains([[0]]) })).toThrow(/1 chains for 2/)
    expect(() => programme({ ...input!, scale: 0 })).toThrow(/scale/)
    expect(() => programme({ ...input!, strengths: Float64Array.of(1, 1, 1, 1, -1) })).toThrow(/strength of chain 4/)
    expect(() => programme({ ...input!, ranges: { ...wideRanges, h: [1, 2] } })).toThrow(/does not hold 0/)
  })
})
