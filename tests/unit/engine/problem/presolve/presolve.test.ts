import { describe, expect, it } from 'vitest'
import { buildProblem } from '../../../../../shared/engine/problem/build'
import { lift } from '../../../../../shared/engine/problem/presolve/lift'
import { presolve } from '../../../../../shared/engine/problem/presolve/presolve'
import { RULES } from '../../../../../shared/engine/problem/presolve/record'
import { COMPONENT_LIMITS } from '../../../../../shared/engine/problem/presolve/small-components'
import type { Form, Problem } from '../../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../../shared/engine/random'
import { randomProblem } from '../../../../fixtures/problems/random-problem'
import { codeOf, DRAWS, exactEnergies, least, stateFrom } from './exact-energies'

const FORMS = ['qubo', 'ising'] as const
const NO_COMPONENTS = { ...COMPONENT_LIMITS, variables: 0 }

/** All that a reduction promises, looked up in the energies of all states of the problem before and after. */
function expectKept(problem: Problem, form: Form, limits = COMPONENT_LIMITS): Set<string> {
  const reduction = presolve(problem, form, undefined, limits)
  const before = exactEnergies(problem, form)
  const after = exactEnergies(reduction.problem, form)
  const lifted = after.map((_, code) => before[codeOf(lift(reduction, stateFrom(code, reduction.problem.n, form)))]!)
  // The least of the lifted ones: all fixings and foldings hold together in some optimum.
  expect(least(lifted)).toBe(least(before))
  if (reduction.isExact) expect(after).toEqual(lifted)
  else
    after.forEach((energy, code) => {
      const size = Number(lifted[code]! < 0n ? -lifted[code]! : lifted[code]!) + 2 ** 100
      expect(Math.abs(Number(energy - lifted[code]!))).toBeLessThan(1e-9 * size)
    })
  expect(BigInt(reduction.lowerBound! * 2 ** 100)).toBeLessThanOrEqual(least(before))
  expect(reduction.kept.length + reduction.steps.variable.length).toBe(problem.n)
  expect(reduction.components.reduce((sum, size) => sum + size, 0)).toBe(reduction.problem.n)
  return new Set(Array.from(reduction.steps.rule, (rule) => RULES[rule]!))
}

describe('presolve', () => {
  it.each(FORMS.flatMap((form) => Object.keys(DRAWS).map((draw) => [form, draw] as const)))(
    'keeps optimum and energies of random %s problems of %s',
    (form, draw) => {
      const random = createRandom(11)
      const used = new Set<string>()
      for (let trial = 0; trial < 250; trial++) {
        const problem = randomProblem(random, random.below(8), random.float(), () => DRAWS[draw]!(random))
        for (const rule of expectKept(problem, form, NO_COMPONENTS)) used.add(rule)
      }
      for (let trial = 0; trial < 40; trial++)
        expectKept(
          randomProblem(random, 6 + random.below(3), random.float(), () => DRAWS[draw]!(random)),
          form,
        )
      expect([...used]).toEqual(expect.arrayContaining(['sign', 'leaf', 'follow']))
    },
  )

  it.each(FORMS)('keeps them for %s problems of up to 14 variables, and uses every rule', (form) => {
    const random = createRandom(12)
    const used = new Set<string>()
    for (let trial = 0; trial < 60; trial++) {
      const n = 9 + random.below(trial % 10 === 0 ? 6 : 3)
      const problem = randomProblem(random, n, (2 + 7 * random.float()) / n, () => DRAWS.integers!(random))
      for (const rule of expectKept(problem, form, trial % 2 === 0 ? COMPONENT_LIMITS : NO_COMPONENTS)) used.add(rule)
    }
    expect([...used].sort()).toEqual([...RULES].sort())
  })

  it('solves forests and cycles completely', () => {
    const random = createRandom(13)
    const n = 400
    const ends = Array.from({ length: n }, (_, v) => (v === 0 ? n - 1 : random.below(v)))
    const values = ends.map(() => random.below(19) - 9)
    const tree = buildProblem(n, { rows: ends.map((_, v) => v), cols: ends, values }, 1).problem
    expect(presolve(tree, 'ising', undefined, NO_COMPONENTS)).toMatchObject({ kept: { length: 0 }, rounds: 0 })
    const ring = { rows: [...ends.keys()], cols: ends.map((_, v) => (v + 1) % n), values: values.map(() => 1) }
    const cycle = presolve(buildProblem(n - 1, ringOf(n - 1, ring), 0).problem, 'ising', undefined, NO_COMPONENTS)
    // An odd cycle of antiferromagnetic couplings leaves one of them unsatisfied.
    expect(cycle.lowerBound).toBe(2 - (n - 1))
    expect(cycle.problem.offset).toBe(2 - (n - 1))
  })

  it('answers the same whenever it is asked, and holds when it is stopped', () => {
    const random = createRandom(14)
    const problem = randomProblem(random, 9, 1, () => 1 + random.below(4) - 6 * random.below(2))
    expect(presolve(problem, 'qubo')).toEqual(presolve(problem, 'qubo'))
    const reports: string[] = []
    const stopped = presolve(problem, 'qubo', { shouldStop: () => true, report: ({ phase }) => reports.push(phase) })
    expect(stopped).toMatchObject({ isStopped: true, lowerBound: null })
    expect(reports).toEqual(['neighbours', 'roof duality', 'components'])
    const before = exactEnergies(problem, 'qubo')
    exactEnergies(stopped.problem, 'qubo').forEach((energy, code) =>
      expect(energy).toBe(before[codeOf(lift(stopped, stateFrom(code, stopped.problem.n, 'qubo')))]),
    )
  })

  it('takes an empty problem, one without coefficients, and coefficients at the ends of the doubles', () => {
    const none = { rows: [], cols: [], values: [] }
    expect(presolve(buildProblem(0, none, 2.5).problem, 'qubo')).toMatchObject({ lowerBound: 2.5, isExact: true })
    expect(presolve(buildProblem(3, none, -1).problem, 'ising')).toMatchObject({ lowerBound: -1, kept: { length: 0 } })
    const wide = { rows: [0, 1, 0, 1], cols: [0, 1, 1, 2], values: [1e300, -5e-324, -3e-300, 2e-320] }
    expect(presolve(buildProblem(3, wide, 0).problem, 'qubo')).toMatchObject({ lowerBound: -5e-324, isExact: true })
    const huge = { rows: [0, 0, 1, 1], cols: [0, 1, 1, 2], values: [-1.7e308, -1e308, -1.7e308, 1] }
    expect(() => presolve(buildProblem(3, huge, 0).problem, 'qubo')).toThrow('beyond the range of doubles')
  })
})

/** The first n − 1 couplings of a ring, and one that closes it sooner. */
const ringOf = (n: number, { rows, cols, values }: { rows: number[]; cols: number[]; values: number[] }) => ({
  rows: rows.slice(0, n),
  cols: cols.slice(0, n).map((v) => v % n),
  values: values.slice(0, n),
})

describe('lift', () => {
  it('refuses a state of another length', () => {
    const problem = buildProblem(3, { rows: [0, 0, 1], cols: [1, 2, 2], values: [1, 1, 1] }, 0).problem
    const reduction = presolve(problem, 'ising', undefined, NO_COMPONENTS)
    expect(() => lift(reduction, new Array<number>(reduction.kept.length + 1).fill(1))).toThrow(RangeError)
  })
})
