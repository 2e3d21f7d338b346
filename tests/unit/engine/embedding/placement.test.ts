import { describe, expect, it } from 'vitest'
import { placeProblem } from '../../../../shared/engine/embedding/placement'
import type { Placement } from '../../../../shared/engine/embedding/placement'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import { sizeOf } from '../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../shared/engine/random'
import { cycleGraph, gridGraph, permutation, randomGraph, regularGraph, relabelled } from '../../../fixtures/graphs'

const never = (): boolean => false

function lengthPerEdge({ ends }: Graph, { x, y }: Placement, columns: number, rows: number): number {
  let sum = 0
  for (let k = 0; k < ends.length; k += 2) {
    const [a, b] = [ends[k]!, ends[k + 1]!]
    sum += Math.abs(x[a]! - x[b]!) * columns + Math.abs(y[a]! - y[b]!) * rows
  }
  return sum / (ends.length / 2)
}

const distinct = ({ x, y }: Placement): number => new Set(Array.from(x, (value, v) => `${value},${y[v]}`)).size

describe('placeProblem', () => {
  it.each([
    ['3-regular', regularGraph(120, 3, createRandom(1)), 11, 11],
    ['in parts, some of them single variables', randomGraph(100, 0.015, createRandom(2)), 12, 9],
    [
      'in equal parts',
      graphFromEdges(30, Array.from({ length: 10 }, (_, i) => [0, 1, 1, 2].map((v) => 3 * i + v)).flat()),
      6,
      5,
    ],
    ['without interactions', graphFromEdges(10, []), 4, 3],
  ])('gives each variable a site of its own: %s', (_, problem, columns, rows) => {
    const placement = placeProblem(problem, null, createRandom(3), { columns, rows, effort: 0.3 }, never)
    expect(distinct(placement)).toBe(problem.order)
    for (const [values, sites] of [
      [placement.x, columns],
      [placement.y, rows],
    ] as const)
      for (const value of values) {
        expect(value).toBeGreaterThan(0)
        expect(value).toBeLessThan(1)
        expect(value * sites - 0.5).toBeCloseTo(Math.round(value * sites - 0.5), 4)
      }
  })

  it('recovers a grid', () => {
    const problem = relabelled(gridGraph(25, 25), permutation(625, createRandom(4)))
    const placement = placeProblem(problem, null, createRandom(5), { columns: 25, rows: 25, effort: 0.1 }, never)
    expect(lengthPerEdge(problem, placement, 25, 25)).toBeCloseTo(1, 4)
  })

  it('makes wires shorter the more effort it is given', () => {
    const problem = regularGraph(300, 3, createRandom(6))
    const at = (effort: number): number => {
      const placement = placeProblem(problem, null, createRandom(7), { columns: 18, rows: 18, effort }, never)
      return lengthPerEdge(problem, placement, 18, 18)
    }
    expect(at(0.1)).toBeLessThan(0.9 * at(0))
    expect(at(1)).toBeLessThan(at(0.1))
    expect(at(1)).toBeLessThan(3)
  })

  it('keeps the parts of a problem together', () => {
    const problem = graphFromEdges(
      300,
      Array.from({ length: 100 }, (_, i) => [0, 1, 1, 2, 0, 2].map((v) => 3 * i + v)).flat(),
    )
    const placement = placeProblem(problem, null, createRandom(8), { columns: 18, rows: 18, effort: 0.3 }, never)
    expect(lengthPerEdge(problem, placement, 18, 18)).toBeLessThan(1.5)
  })

  it('places only the variables asked for, as if the others were not there', () => {
    const cycle = cycleGraph(9)
    const problem = graphFromEdges(12, [...cycle.ends, 0, 9, 9, 10, 10, 11])
    const vertices = Int32Array.from({ length: 9 }, (_, v) => v)
    const options = { columns: 3, rows: 3, effort: 1 }
    const placement = placeProblem(problem, vertices, createRandom(9), options, never)
    const alone = placeProblem(cycle, null, createRandom(9), options, never)
    expect(placement.x.subarray(0, 9)).toEqual(alone.x)
    expect(placement.y.subarray(0, 9)).toEqual(alone.y)
    expect([...placement.x.subarray(9)]).toEqual([NaN, NaN, NaN])
  })

  it('is the same for the same random numbers', () => {
    const problem = randomGraph(60, 0.05, createRandom(10))
    const run = (): Placement =>
      placeProblem(problem, null, createRandom(11), { columns: 8, rows: 8, effort: 0.3 }, never)
    expect(run()).toEqual(run())
  })

  it('has a placement to show when stopped at once', () => {
    const problem = regularGraph(60, 3, createRandom(12))
    const placement = placeProblem(problem, null, createRandom(13), { columns: 8, rows: 8, effort: 1 }, () => true)
    expect(distinct(placement)).toBe(60)
  })

  it('takes no variables, one and two', () => {
    for (const problem of [graphFromEdges(0, []), graphFromEdges(1, []), graphFromEdges(2, [0, 1])]) {
      const placement = placeProblem(problem, null, createRandom(14), { columns: 2, rows: 1, effort: 1 }, never)
      expect(distinct(placement)).toBe(problem.order)
      expect(sizeOf(problem) === 0 || lengthPerEdge(problem, placement, 2, 1) === 1).toBe(true)
    }
  })

  it('refuses more variables than sites', () => {
    const options = { columns: 3, rows: 3, effort: 1 }
    expect(() => placeProblem(cycleGraph(10), null, createRandom(1), options, never)).toThrow('10 vertices do not fit')
  })
})
