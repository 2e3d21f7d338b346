import { expect, it } from 'vitest'
import { coefficientTotal, energyGrid } from '../../../../../shared/engine/problem/optimum/grid'

const of = (linear: number[], values: number[]) =>
  energyGrid({ linear: Float64Array.from(linear), values: Float64Array.from(values) })

it.each([
  [[3, -6], [9], 3],
  [[0.5, 1.5], [-2], 0.5],
  [[0, 0], [], 1],
  [[0.75], [0.25, 12], 0.25],
  [[2 ** 40], [2 ** 42], 2 ** 40],
  [[0.1], [1], null],
  [[2 ** 60], [1], null],
  [[1e300], [3], null],
])('%j and %j lie on a grid of %s', (linear, values, step) => {
  expect(of(linear, values)).toBe(step)
})

it('adds up sizes', () => {
  expect(coefficientTotal({ linear: Float64Array.of(1, -2), values: Float64Array.of(-0.5) })).toBe(3.5)
})
