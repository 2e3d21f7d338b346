import { expect, it } from 'vitest'
import { programme } from '../../../../shared/engine/programming/programme'
import type { Programmed } from '../../../../shared/engine/programming/programme'
import { must, physicalEnergy, randomInstance, statesOf, wideRanges } from '../programming/instances'
import { clusterSpins, logicalSpins } from '../../../../shared/engine/spectrum/spins'

const programmed = {
  qubits: Uint32Array.from([3, 5, 8, 9]),
  h: Float64Array.from([0.1, 0.2, 0.3, 0.4]),
  ends: Uint32Array.from([0, 1, 1, 2, 2, 3, 0, 3]),
  J: Float64Array.from([-1, 0.5, -1, 0.25]),
  chainOf: Uint32Array.from([0, 0, 1, 2]),
} as unknown as Programmed

it('takes the qubits of the chains chosen, with what joins them, in order of qubits', () => {
  const { model, positions } = clusterSpins(programmed, [2, 0])
  expect([...positions]).toEqual([0, 1, 3])
  expect([...model.h]).toEqual([0.1, 0.2, 0.4])
  expect([...model.ends]).toEqual([0, 1, 0, 2])
  expect([...model.J]).toEqual([-1, 0.25])
})

it('takes every coefficient of the logical problem times the scale', () => {
  const ising = {
    n: 3,
    linear: Float64Array.from([1, 0, -2]),
    rows: Uint32Array.from([0, 1]),
    cols: Uint32Array.from([2, 2]),
    values: Float64Array.from([4, -6]),
    offset: 7,
  }
  const { h, ends, J } = logicalSpins(ising, 0.5)
  expect([[...h], [...ends], [...J]]).toEqual([
    [0.5, 0, -1],
    [0, 2, 1, 2],
    [2, -3],
  ])
})

it.each([1, 2, 3, 4, 5])(
  'has energies of the whole problem but a constant where all other chains are held (%i)',
  (seed) => {
    const instance = randomInstance(seed, { order: 22, sizes: [4, 3, 4, 2, 3], density: 0.25, field: 1 })
    const programmed = must(
      programme({
        ...instance,
        strengths: Float64Array.of(1, 2, 3, 1, 2),
        ranges: wideRanges,
        fieldSplit: 'even',
        chainCouplers: 'all',
      }).programmed,
    )
    const held = [1, -1, -1, 1, seed % 2 ? 1 : -1]
    const { model, positions } = clusterSpins(programmed, [1, 3], held)
    const whole = Array.from(programmed.chainOf, (i) => held[i]!)
    const differences = [...statesOf(positions.length)].map((state) => {
      const full = whole.slice()
      positions.forEach((p, spin) => (full[p] = state[spin]!))
      return physicalEnergy(programmed, full) - physicalEnergy(model, state)
    })
    for (const difference of differences) expect(difference).toBeCloseTo(differences[0]!, 10)
    // Left out, the others make a difference: the couplings between are not all zero.
    const alone = clusterSpins(programmed, [1, 3]).model.h
    expect([...alone].some((field, spin) => field !== model.h[spin])).toBe(true)
  },
)
