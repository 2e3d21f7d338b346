import type { Control } from '../../shared/engine/control'
import { buildProblem } from '../../shared/engine/problem/build'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import { annealRestarts } from '../../shared/engine/problem/optimum/anneal-restarts'
import { minimiseByElimination } from '../../shared/engine/problem/optimum/eliminate'
import { planElimination } from '../../shared/engine/problem/optimum/elimination-plan'
import { enumerateSlice } from '../../shared/engine/problem/optimum/enumerate-slice'
import { planOptimum } from '../../shared/engine/problem/optimum/plan'
import { sufficientGap } from '../../shared/engine/problem/optimum/outcome'
import type { Problem } from '../../shared/engine/problem/problem'
import { createRandom } from '../../shared/engine/random'
import { newSearchClock } from '../../server/workers/search-clock'
import { solveProgramme } from '../../server/workers/tasks/solve-programme'

/** One thing to measure: what it did, in a unit that a rate can be made of, and what came out. */
export interface OptimumRow {
  readonly name: string
  readonly unit: string
  /** @returns units of work done, and a remark on the outcome */
  readonly run: () => Promise<{ work: number; outcome: string }>
}

const idle: Control<unknown> = { now: () => 0, cancelled: () => false, report: () => {} }
const MIP_SECONDS = 60

/** Coefficients from −10 to 10; each pair interacts where `joins` says so. */
function drawn(n: number, seed: number, joins: (i: number, j: number, draw: number) => boolean): Problem {
  const random = createRandom(seed)
  const [rows, cols, values]: number[][] = [[], [], []]
  for (let i = 0; i < n; i++)
    for (let j = i; j < n; j++) {
      if (i !== j && !joins(i, j, random.float())) continue
      rows!.push(i)
      cols!.push(j)
      values!.push(random.below(21) - 10)
    }
  return buildProblem(n, { rows: rows!, cols: cols!, values: values! }, 0).problem
}
const sparse = (n: number, degree: number, seed: number) => drawn(n, seed, (_i, _j, draw) => draw < degree / (n - 1))
/** Every variable interacts with the `width` after it: the treewidth is `width`. */
const band = (n: number, width: number, seed: number) => drawn(n, seed, (i, j) => j - i <= width)

const enumeration = (n: number): OptimumRow => ({
  name: `enumeration, ${n} variables, dense`,
  unit: 'M states',
  run: async () => {
    const { energy, count } = enumerateSlice(
      drawn(n, n, () => true),
      0,
      idle,
    )
    return { work: 2 ** n / 1e6, outcome: `${energy}, ${count} states` }
  },
})

const elimination = (n: number, width: number): OptimumRow => ({
  name: `tree decomposition, ${n} variables, band of ${width}`,
  unit: 'M entries',
  run: async () => {
    const problem = band(n, width, width)
    const plan = planElimination(interactionGraph(problem), 24)
    if (!plan) throw new Error('no plan')
    const { energy } = minimiseByElimination(problem, plan, idle)!
    const memory = Math.round(plan.bytes / 2 ** 20)
    return { work: plan.work / 1e6, outcome: `${energy}, width ${plan.width}, ${memory} MiB` }
  },
})

const programme = (n: number, degree: number): OptimumRow => ({
  name: `integer programme, ${n} variables, degree ${degree}`,
  unit: 'problems',
  run: async () => {
    const part = planOptimum(sparse(n, degree, n), 'qubo', 'integer programme').parts.at(-1)!
    const { state } = annealRestarts(part.qubo, { first: 0, restarts: 32, sweeps: 1000, seed: 1 }, idle)
    const clock = newSearchClock()
    const deadline = { clock, seconds: MIP_SECONDS }
    const input = { qubo: part.qubo, start: state, gap: sufficientGap(part), seed: 1, deadline }
    const outcome = await solveProgramme(input, idle)
    return { work: 1, outcome: `bound ${outcome?.bound.toFixed(2)}` }
  },
})

/** Restarts until the energy that many more restarts reach is met for the first time. */
const annealing = (n: number, degree: number): OptimumRow => ({
  name: `annealing, ${n} variables, degree ${degree}, 32 restarts`,
  unit: 'M flips offered',
  run: async () => {
    const options = { first: 0, restarts: 32, sweeps: 1000, seed: 1 }
    const best = annealRestarts(sparse(n, degree, n), options, idle)
    const outcome = `${best.energy}, first in restart ${best.restart + 1}, in ${best.hits} of ${best.done}`
    return { work: (options.restarts * options.sweeps * n) / 1e6, outcome }
  },
})

export const ROWS: readonly OptimumRow[] = [
  enumeration(20),
  enumeration(25),
  elimination(60, 16),
  elimination(60, 20),
  elimination(40, 22),
  programme(40, 5),
  programme(50, 5),
  programme(60, 6),
  annealing(100, 10),
  annealing(1000, 10),
]
