import { expect, test } from 'vitest'
import { packStates } from '../../../../server/services/problems'
import { requireRoom } from '../../../../server/services/rehearsals'

test('states are packed one after the other', () => {
  expect([
    ...packStates(
      {
        form: 'ising',
        states: [
          [1, -1],
          [-1, -1],
        ],
      },
      2,
    ),
  ]).toEqual([1, -1, -1, -1])
})

test('the first state and place that do not fit are named', () => {
  expect(() => packStates({ form: 'qubo', states: [[0, 1], [1]] }, 2)).toThrow('State 1 has 1 values')
  expect(() => packStates({ form: 'qubo', states: [[0, -1]] }, 2)).toThrow('the value -1 at place 1')
  expect(() => packStates({ form: 'ising', states: [[0.5, 1]] }, 2)).toThrow('the value 0.5 at place 0')
})

test('a rehearsal that memory could not hold is refused, with the number of reads that it could', () => {
  expect(() => requireRoom(100_000, 20_000)).not.toThrow()
  expect(() => requireRoom(100_000, 90_000)).toThrow('at most 23860 reads of 90000 qubits')
})
