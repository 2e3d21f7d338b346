import { expect, it } from 'vitest'
import { Assignment } from '../../../../../shared/engine/embedding/lines/assignment'
import { Coin } from '../../../../../shared/engine/embedding/lines/coin'
import { crossingsOf } from '../../../../../shared/engine/embedding/lines/crossings'
import { seat } from '../../../../../shared/engine/embedding/lines/seat'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../../shared/engine/random'
import { gridGraph, randomGraph } from '../../../../fixtures/graphs'
import { scatter, taskOn } from './machines'

const FAMILY = { kind: 'pegasus', m: 8, trimmed: true } as const

function begun(problem: Graph, how: 'seated' | 'scattered'): Assignment {
  const random = createRandom(5)
  const { machine, usable, segments } = taskOn(FAMILY, problem, 0.02, random)
  const assignment = new Assignment(problem, crossingsOf(machine, usable, segments)!)
  const coin = new Coin(random)
  if (how === 'seated') seat(assignment, random, coin, () => false)
  else scatter(assignment, coin)
  return assignment
}

it('begins a lattice with less than half of the qubits that random lines take', () => {
  const problem = gridGraph(14, 14)
  expect(begun(problem, 'seated').length).toBeLessThan(begun(problem, 'scattered').length / 2)
})

it('keeps a small problem together', () => {
  const { line, crossings } = begun(gridGraph(4, 4), 'seated')
  for (const side of [0, 1] as const) {
    const lines = line.filter((_, part) => (part & 1) === side)
    expect(Math.max(...lines) - Math.min(...lines)).toBeLessThan(crossings.counts[side] / 3)
  }
})

it('gives the same lines for the same random numbers', () => {
  const problem = gridGraph(9, 5)
  expect(begun(problem, 'seated').line).toEqual(begun(problem, 'seated').line)
})

it('takes a problem without interactions as it is', () => {
  expect(begun(randomGraph(3, 0, createRandom(1)), 'seated').length).toBe(0)
})
