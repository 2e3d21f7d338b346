import { describe, expect, it } from 'vitest'
import { Assignment } from '../../../../../shared/engine/embedding/lines/assignment'
import { crossingsOf } from '../../../../../shared/engine/embedding/lines/crossings'
import type { EmbeddingTask } from '../../../../../shared/engine/embedding/task'
import { createRandom } from '../../../../../shared/engine/random'
import { randomGraph } from '../../../../fixtures/graphs'
import { SMALL_FAMILIES, taskOn } from './machines'

/** Lines and crossings of a machine, read off its segments and couplers anew. */
function geometryOf({ machine, segments, usable }: EmbeddingTask) {
  const isVertical = (q: number): boolean => segments![4 * q] === segments![4 * q + 2]
  const across = (q: number): number => (isVertical(q) ? segments![4 * q]! : segments![4 * q + 1]!)
  const along = (q: number): number => (isVertical(q) ? segments![4 * q + 1]! : segments![4 * q]!)
  const all = [...usable.keys()]
  const linesOnSide = (vertical: boolean): number[][] => {
    const ours = all.filter((q) => isVertical(q) === vertical)
    const standing = [...new Set(ours.map(across))].sort((a, b) => a - b)
    return standing.map((at) => ours.filter((q) => across(q) === at).sort((a, b) => along(a) - along(b)))
  }
  const lines = [linesOnSide(true), linesOnSide(false)] as const
  const coupled = new Set<string>()
  for (let k = 0; k < machine.ends.length; k += 2) {
    coupled.add(`${machine.ends[k]} ${machine.ends[k + 1]}`)
    coupled.add(`${machine.ends[k + 1]} ${machine.ends[k]}`)
  }
  const areCoupled = (a: number, b: number): boolean => coupled.has(`${a} ${b}`)
  return { lines, areCoupled }
}

/** Length, pairs and missing crossings from the lines and served sides alone. */
function slowEnergy(assignment: Assignment, task: EmbeddingTask, geometry: ReturnType<typeof geometryOf>) {
  const { problem, usable } = task
  const { lines, areCoupled } = geometry
  const needed: [side: 0 | 1, line: number][][] = Array.from({ length: 2 * problem.order }, () => [])
  for (let k = 0; k < problem.ends.length / 2; k++) {
    const side = assignment.sideOf(k) as 0 | 1
    const [a, b] = [problem.ends[2 * k]!, problem.ends[2 * k + 1]!]
    const other = (1 - side) as 0 | 1
    needed[2 * a + side]!.push([other, assignment.line[2 * b + other]!])
    needed[2 * b + other]!.push([side, assignment.line[2 * a + side]!])
  }
  for (let v = 0; v < problem.order; v++) {
    if (needed[2 * v]!.length === 0 || needed[2 * v + 1]!.length === 0) continue
    needed[2 * v]!.push([1, assignment.line[2 * v + 1]!])
    needed[2 * v + 1]!.push([0, assignment.line[2 * v]!])
  }
  let [length, pairs, missing] = [0, 0, 0]
  const use = Array.from(usable, (works) => 1 - works)
  needed.forEach((crossed, part) => {
    const qubits = lines[part & 1]![assignment.line[part]!]!
    const places = crossed.map(([side, line]) =>
      qubits.findIndex((q) => lines[side][line]!.some((r) => areCoupled(q, r))),
    )
    missing += places.filter((place) => place < 0).length
    const met = places.filter((place) => place >= 0)
    if (met.length === 0) return
    for (let place = Math.min(...met); place <= Math.max(...met); place++) {
      length++
      use[qubits[place]!]!++
      if (place === Math.max(...met)) break
      const [q, r] = [qubits[place]!, qubits[place + 1]!]
      if (usable[q] && usable[r] && !areCoupled(q, r)) pairs++
    }
  })
  use.forEach((count) => (pairs += (count * (count - 1)) / 2))
  return { length, pairs, missing }
}

const kept = ({ length, pairs, missing }: Assignment) => ({ length, pairs, missing })

describe('Assignment', () => {
  it('keeps length, pairs and missing crossings as a recomputation has them, through changes and undoing', () => {
    const random = createRandom(41)
    for (let round = 0; round < 20; round++) {
      const problem = randomGraph(3 + random.below(9), 0.2 + 0.6 * random.float(), random)
      const task = taskOn(SMALL_FAMILIES[round % 5]!, problem, round % 2 ? 0.06 : 0, random)
      const geometry = geometryOf(task)
      const assignment = new Assignment(problem, crossingsOf(task.machine, task.usable, task.segments)!)
      const { counts } = assignment.crossings
      expect(kept(assignment)).toEqual(slowEnergy(assignment, task, geometry))
      for (let step = 0; step < 60; step++) {
        const before = kept(assignment)
        assignment.setWeights(0.1, 1)
        assignment.begin()
        for (let changes = 1 + random.below(3); changes > 0; changes--) {
          const part = random.below(2 * problem.order)
          const line = random.below(counts[part & 1]!)
          const kind = random.below(3)
          if (kind === 0) assignment.move(part, line)
          else if (kind === 1) assignment.settle(part, line, random.below(9))
          else if (problem.ends.length > 0) assignment.flip(random.below(problem.ends.length / 2))
        }
        expect(kept(assignment)).toEqual(slowEnergy(assignment, task, geometry))
        if (random.below(2) === 0) continue
        assignment.undo()
        expect(kept(assignment)).toEqual(before)
        expect(kept(assignment)).toEqual(slowEnergy(assignment, task, geometry))
      }
    }
  })

  it('settles on the cheapest of lines that are alike', () => {
    const random = createRandom(42)
    for (let round = 0; round < 10; round++) {
      const problem = randomGraph(14, 0.4, random)
      const task = taskOn({ kind: 'chimera', m: 4, n: 3, t: 2 + (round % 3) }, problem, 0, random)
      const assignment = new Assignment(problem, crossingsOf(task.machine, task.usable, task.segments)!)
      const { counts, alikeFrom, alikeTo, first } = assignment.crossings
      for (let part = 0; part < 2 * problem.order; part++) {
        assignment.begin()
        assignment.move(part, random.below(counts[part & 1]!))
      }
      assignment.setWeights(0.5, 2)
      const energy = (): number => 0.5 * assignment.length + 2 * assignment.pairs + 4 * assignment.missing
      for (let step = 0; step < 20; step++) {
        const part = random.below(2 * problem.order)
        const line = random.below(counts[part & 1]!)
        const reached = [alikeFrom, alikeTo].map((ends) => ends[first[part & 1]! + line]!) as [number, number]
        let least = Infinity
        for (let candidate = reached[0]; candidate < reached[1]; candidate++) {
          assignment.begin()
          assignment.move(part, candidate)
          least = Math.min(least, energy())
          assignment.undo()
        }
        assignment.begin()
        assignment.settle(part, line, random.below(9))
        expect(energy()).toBeCloseTo(least, 9)
        expect(assignment.line[part]).toBeGreaterThanOrEqual(reached[0])
        expect(assignment.line[part]).toBeLessThan(reached[1])
      }
    }
  })
})
