import { describe, expect, it } from 'vitest'
import { edgeBetween } from '../../../../shared/engine/graph/build'
import { sizeOf } from '../../../../shared/engine/graph/graph'
import { interactionGraph } from '../../../../shared/engine/problem/interaction-graph'
import { createRandom } from '../../../../shared/engine/random'
import { randomProblem, real } from '../../../fixtures/problems/random-problem'

describe('interactionGraph', () => {
  it('has one vertex a variable, and interaction k as its edge k', () => {
    const problem = randomProblem(createRandom(2), 20, 0.3, real)
    const graph = interactionGraph(problem)
    expect(graph.order).toBe(20)
    expect(sizeOf(graph)).toBe(problem.values.length)
    problem.rows.forEach((row, k) => expect(edgeBetween(graph, row, problem.cols[k]!)).toBe(k))
  })
})
