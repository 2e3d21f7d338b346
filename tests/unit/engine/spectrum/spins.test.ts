import { expect, it } from 'vitest'
import type { Programmed } from '../../../../shared/engine/programming/programme'
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
