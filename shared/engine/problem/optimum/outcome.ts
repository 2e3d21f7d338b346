/**
 * What each method found for a component, judged: the energy is summed anew from the state, and "proved" is said only
 * where the method came to its end and its bound leaves room for no better state beyond a stated tolerance.
 */
import { energyOf } from '../energy'
import type { Form, Problem } from '../problem'
import type { AnnealedBest } from './anneal-restarts'
import { quickLowerBound } from './bounds'
import type { EliminationOutcome } from './eliminate'
import type { SliceOutcome } from './enumerate-slice'
import { enumerationTolerance } from './enumerate-slice'
import { coefficientTotal } from './grid'
import type { OptimumMethod, OptimumPart, OptimumPlan } from './plan'

/** How far the bound of a solver that works in floating point may be off, as a share of all coefficients. */
const SOLVER_SHARE = 1e-6

/** The best state of one component. */
export interface PartOutcome {
  /** Of the component's QUBO, without offset. */
  readonly energy: number
  /** One byte a variable of the component, 0 or 1. */
  readonly state: Uint8Array
  /** No state of the component lies below it. */
  readonly bound: number
  readonly proved: boolean
  /** What "proved" leaves open: 0 where the coefficients allow exact sums. */
  readonly tolerance: number
  /** The method that gave the state. */
  readonly by: OptimumMethod
  /** Optimal states of the component, where all states were visited. */
  readonly optima: number | null
}

/** What an integer programme left behind. */
export interface ProgrammeOutcome {
  /** The best state it knew; null where it had none. */
  readonly state: Uint8Array | null
  /** As the solver computed it, without offset; −Infinity where it had none. */
  readonly bound: number
}

/** The lowest multiple of the grid above `energy` − k·grid that the bound allows; the bound itself without a grid. */
function onGrid(bound: number, energy: number, grid: number | null): number {
  if (grid === null || bound === -Infinity) return Math.min(bound, energy)
  return energy - Math.max(0, Math.floor((energy - bound) / grid)) * grid
}

function judged(part: OptimumPart, state: Uint8Array, bound: number, by: OptimumMethod, slack: number): PartOutcome {
  const energy = energyOf(part.qubo, state)
  const best = onGrid(Math.max(bound - slack, quickLowerBound(part.qubo)), energy, part.grid)
  const proved = energy - best <= (part.grid === null ? 2 * slack : 0)
  const tolerance = proved ? energy - best : 0
  return { energy, state, bound: best, proved, tolerance, by, optima: null }
}

const better = (
  part: OptimumPart,
  a: Uint8Array | null,
  b: Uint8Array | null,
): { state: Uint8Array; isFirst: boolean } => {
  if (!a && !b) return { state: new Uint8Array(part.qubo.n), isFirst: false }
  const isFirst = a !== null && (b === null || energyOf(part.qubo, a) <= energyOf(part.qubo, b))
  return { state: isFirst ? a : b!, isFirst }
}

/** Of annealing alone; of nothing at all it is the state with everything down. */
export function annealedOutcome(part: OptimumPart, annealed: AnnealedBest | null): PartOutcome {
  return judged(part, annealed?.state ?? new Uint8Array(part.qubo.n), -Infinity, 'annealing', 0)
}

/** Of the slices of an enumeration, merged; where it was given up the best state of both. */
export function enumeratedOutcome(part: OptimumPart, slices: SliceOutcome, annealed: AnnealedBest | null): PartOutcome {
  const { state, isFirst } = better(part, slices.states[0] ?? null, annealed?.state ?? null)
  const by = isFirst ? 'enumeration' : 'annealing'
  if (!slices.complete) return judged(part, state, -Infinity, by, 0)
  const tolerance = part.grid === null ? enumerationTolerance(part.qubo) : 0
  const energy = energyOf(part.qubo, state)
  return { energy, state, bound: energy - tolerance, proved: true, tolerance, by, optima: slices.count }
}

/** Of a tree decomposition; where it was given up what annealing left. */
export function eliminatedOutcome(
  part: OptimumPart,
  eliminated: EliminationOutcome | null,
  annealed: AnnealedBest | null,
): PartOutcome {
  if (!eliminated) return annealedOutcome(part, annealed)
  const energy = energyOf(part.qubo, eliminated.state)
  const tolerance = part.grid === null ? 2 * eliminated.tolerance : 0
  const { state } = eliminated
  return { energy, state, bound: energy - tolerance, proved: true, tolerance, by: 'tree decomposition', optima: null }
}

/** Of an integer programme. Its bound is lowered by what floating point may have added, and raised to the grid. */
export function programmeOutcome(
  part: OptimumPart,
  programme: ProgrammeOutcome,
  annealed: AnnealedBest | null,
): PartOutcome {
  const { state, isFirst } = better(part, annealed?.state ?? null, programme.state)
  const slack = SOLVER_SHARE * coefficientTotal(part.qubo)
  return judged(part, state, programme.bound, isFirst ? 'annealing' : 'integer programme', slack)
}

/** How far below the best energy a solver's bound may stop: less than a step of the grid leaves no room for another state. */
export function sufficientGap({ grid, qubo }: OptimumPart): number {
  const slack = SOLVER_SHARE * coefficientTotal(qubo)
  return grid === null ? 0 : Math.max(0, grid - 2 * slack) / 2
}

/** The best known state of a whole problem and what is known about it. */
export interface Optimum {
  /** Of the problem in its own form, offset included, summed anew. */
  readonly energy: number
  /** One byte a variable: 1 is up (x = 1, s = +1), 0 is down. */
  readonly state: Uint8Array
  /** No state lies below it. */
  readonly bound: number
  readonly proved: boolean
  readonly tolerance: number
}

/** Puts the components together; `outcomes` are in the order of the plan's parts. */
export function assembleOptimum(
  problem: Problem,
  form: Form,
  plan: OptimumPlan,
  outcomes: readonly PartOutcome[],
): Optimum {
  const state = new Uint8Array(problem.n)
  plan.isolated.forEach((v, k) => (state[v] = plan.isolatedState[k]!))
  outcomes.forEach((outcome, p) => plan.parts[p]!.variables.forEach((v, k) => (state[v] = outcome.state[k]!)))
  const down = form === 'ising' ? -1 : 0
  const energy = energyOf(
    problem,
    Float64Array.from(state, (value) => (value === 1 ? 1 : down)),
  )
  const gap = outcomes.reduce((sum, outcome) => sum + (outcome.energy - outcome.bound), 0)
  const proved = outcomes.every((outcome) => outcome.proved)
  return { energy, state, bound: energy - gap, proved, tolerance: proved ? gap : 0 }
}
