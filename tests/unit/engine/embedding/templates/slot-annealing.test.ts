import { describe, expect, it } from 'vitest'
import { Watch } from '../../../../../shared/engine/embedding/progress'
import { SlotAnnealer } from '../../../../../shared/engine/embedding/templates/slot-annealing'
import { emptyTemplate, setMeeting } from '../../../../../shared/engine/embedding/templates/template'
import type { Template } from '../../../../../shared/engine/embedding/templates/template'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { createRandom } from '../../../../../shared/engine/random'
import { cycleGraph, permutation, randomGraph } from '../../../../fixtures/graphs'

/** Slots with two arms that meet at random places, some not at all, and some without a corner. */
function randomTemplate(slots: number, seed: number): Template {
  const random = createRandom(seed)
  const arm = Uint32Array.from({ length: 6 }, (_, place) => place)
  const template = emptyTemplate(Array.from({ length: slots }, () => [arm, arm]))
  for (let s = 0; s < slots; s++) {
    if (random.float() < 0.8) template.corners.set([random.below(6), random.below(6)], 2 * s)
    for (let t = 0; t < s; t++)
      if (random.float() < 0.9)
        setMeeting(template, [s, random.below(2), random.below(6)], [t, random.below(2), random.below(6)])
  }
  return template
}

/** Σ over variables of squared qubits on the arms, plus 400 for each partner that is not met, with sets of places. */
function costOf(problem: Graph, template: Template, slotOf: Int32Array): number {
  let cost = 0
  for (let i = 0; i < problem.order; i++) {
    const s = slotOf[i]!
    if (s < 0) continue
    const places: number[][] = [[], []]
    for (const j of problem.targets.subarray(problem.offsets[i]!, problem.offsets[i + 1]!)) {
      if (slotOf[j]! < 0) continue
      const entry = s * template.slots + slotOf[j]!
      if (template.armTo[entry] === 2) cost += 400
      else places[template.armTo[entry]!]!.push(template.placeTo[entry]!)
    }
    if (places.every((of) => of.length > 0) && template.corners[2 * s]! >= 0)
      places.forEach((of, arm) => of.push(template.corners[2 * s + arm]!))
    const length = places
      .map((of) => (of.length > 0 ? Math.max(...of) - Math.min(...of) + 1 : 0))
      .reduce((sum, part) => sum + part, 0)
    cost += length * length
  }
  return cost
}

describe('SlotAnnealer', () => {
  const watch = (): Watch =>
    new Watch({ now: () => 0, cancelled: () => false, report: () => {} }, 'template', 1, Infinity)

  it('keeps its cost equal to a recount and slots apart, leaves out who has none, and gets better', () => {
    for (let seed = 1; seed <= 6; seed++) {
      const random = createRandom(seed, 2)
      const problem = randomGraph(14, 0.4, random)
      const template = randomTemplate(20, seed)
      const slotOf = Int32Array.from(permutation(20, random).slice(0, 14))
      slotOf[3] = -1
      const annealer = new SlotAnnealer(problem, template, slotOf, random)
      const before = annealer.cost
      expect(before).toBe(costOf(problem, template, slotOf))
      annealer.run(watch())
      expect(annealer.cost).toBe(costOf(problem, template, annealer.slotOf))
      expect(annealer.cost).toBeLessThanOrEqual(before)
      expect(annealer.slotOf[3]).toBe(-1)
      expect(new Set(annealer.slotOf).size).toBe(14)
    }
  })

  it('exchanges slots only within their group', () => {
    const template = randomTemplate(12, 9)
    template.groupOf.fill(1, 6)
    const slotOf = Int32Array.from([0, 6, 1, 7, 2, 8])
    const annealer = new SlotAnnealer(cycleGraph(6), template, slotOf, createRandom(1))
    annealer.run(watch())
    expect([...annealer.slotOf].map((s) => (s < 6 ? 0 : 1))).toEqual([0, 1, 0, 1, 0, 1])
  })
})
