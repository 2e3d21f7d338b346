import { describe, expect, it } from 'vitest'
import { Assignment } from '../../../../../shared/engine/embedding/lines/assignment'
import { Coin } from '../../../../../shared/engine/embedding/lines/coin'
import { crossingsOf } from '../../../../../shared/engine/embedding/lines/crossings'
import { isWhole, lacks, mendOnce } from '../../../../../shared/engine/embedding/lines/repair'
import { verifyEmbedding } from '../../../../../shared/engine/embedding/verify'
import { createRandom } from '../../../../../shared/engine/random'
import { randomGraph } from '../../../../fixtures/graphs'
import { scatter, SMALL_FAMILIES, taskOn } from './machines'

describe('mendOnce', () => {
  it('makes disjoint connected chains of any intervals, and lists just what they lack', () => {
    const random = createRandom(71)
    let [whole, lacking] = [0, 0]
    for (let round = 0; round < 80; round++) {
      const problem = randomGraph(2 + random.below(10), 0.1 + 0.5 * random.float(), random)
      const { machine, usable, segments } = taskOn(SMALL_FAMILIES[round % 5]!, problem, 0.05, random)
      const assignment = new Assignment(problem, crossingsOf(machine, usable, segments)!)
      const coin = new Coin(random)
      scatter(assignment, coin)
      const mended = mendOnce(assignment, machine, usable, coin)
      const rules = verifyEmbedding(problem, machine, usable, mended.chains.toEmbedding()).map(({ rule }) => rule)
      expect(rules.filter((rule) => rule === 'missing coupler')).toHaveLength(mended.unmet.length)
      expect(rules.filter((rule) => rule === 'empty chain')).toHaveLength(mended.unplaced)
      expect(rules).toHaveLength(lacks(mended))
      if (isWhole(mended)) whole++
      else lacking++
    }
    expect(Math.min(whole, lacking)).toBeGreaterThan(5)
  })

  it('loses nothing where intervals do not overlap, and takes no more qubits than they do', () => {
    const random = createRandom(72)
    let checked = 0
    for (let round = 0; round < 200; round++) {
      const problem = randomGraph(2 + random.below(4), 0.7, random)
      const { machine, usable, segments } = taskOn(SMALL_FAMILIES[round % 5]!, problem, 0.01, random)
      const assignment = new Assignment(problem, crossingsOf(machine, usable, segments)!)
      const coin = new Coin(random)
      scatter(assignment, coin)
      if (assignment.pairs > 0 || assignment.missing > 0) continue
      checked++
      const mended = mendOnce(assignment, machine, usable, coin)
      expect(isWhole(mended)).toBe(true)
      const alone = Array.from({ length: problem.order }, (_, v) => problem.offsets[v + 1] === problem.offsets[v])
      const { length } = mended.chains.toEmbedding().qubits
      expect(length).toBeLessThanOrEqual(assignment.length + alone.filter(Boolean).length)
    }
    expect(checked).toBeGreaterThan(20)
  })
})
