import type { Highs, HighsCallbackMap, Model, ModelData } from 'highs'
import type { Control } from '../../../shared/engine/control'
import { energyOf } from '../../../shared/engine/problem/energy'
import type { LinearProgramme } from '../../../shared/engine/problem/optimum/linearise'
import { columnsOf, linearise } from '../../../shared/engine/problem/optimum/linearise'
import type { ProgrammeOutcome } from '../../../shared/engine/problem/optimum/outcome'
import type { Problem } from '../../../shared/engine/problem/problem'
import type { Deadline } from '../deadline'
import { secondsLeft, untilDeadline } from '../deadline'

export interface SolveProgrammeInput {
  qubo: Problem
  /** A state to begin from, one byte a variable. */
  start: Uint8Array
  /** How far below the best energy the bound may stop. */
  gap: number
  seed: number
  deadline: Deadline
}

export interface ProgrammeProgress {
  /** Without offset; null while there is none. */
  energy: number | null
  bound: number | null
}

/** The solver's seeds are 31-bit integers. */
const SEEDS = 2 ** 31 - 1

let loaded: Promise<Highs> | undefined
/** Only a thread that solves a programme fetches the solver, once. */
const loadSolver = (): Promise<Highs> => (loaded ??= import('highs').then((module) => module.default()))

function modelOf(highs: Highs, programme: LinearProgramme): ModelData {
  const { cost, columnUpper, rowStarts, columns, weights, rowLower, binaries } = programme
  const [numCols, numRows] = [cost.length, rowLower.length]
  return {
    numCols,
    numRows,
    colCost: cost,
    colLower: new Float64Array(numCols),
    colUpper: columnUpper,
    rowLower,
    rowUpper: new Float64Array(numRows).fill(highs.infinity),
    matrix: { format: 'csr', numCols, numRows, starts: rowStarts, indices: columns, values: weights },
    integrality: new Int32Array(numCols).fill(highs.constants.variableType.integer, 0, binaries),
  }
}

/** The solver writes infinity as 1e20 or more in places. */
const isBound = (bound: number | undefined): bound is number => bound !== undefined && Math.abs(bound) < 1e20

const roundedState = (values: Float64Array, binaries: number): Uint8Array =>
  Uint8Array.from({ length: binaries }, (_, i) => (values[i]! > 0.5 ? 1 : 0))

/** Stops the solver at its checkpoints, and tells where it stands. */
function watch(highs: Highs, qubo: Problem, scale: number, control: Control<ProgrammeProgress>): HighsCallbackMap {
  const { mipInterrupt, mipImprovingSolution, simplexInterrupt } = highs.constants.callbackType
  let energy: number | null = null
  return {
    [mipImprovingSolution](event) {
      const values = event.data.mip_solution
      if (values) energy = energyOf(qubo, roundedState(values, qubo.n))
      return undefined
    },
    [mipInterrupt](event) {
      const bound = event.data.mip_dual_bound
      control.report({ energy, bound: isBound(bound) ? bound * scale : null })
      if (control.cancelled()) event.interrupt()
      return undefined
    },
    [simplexInterrupt](event) {
      if (control.cancelled()) event.interrupt()
      return undefined
    },
  }
}

function outcomeOf(highs: Highs, model: Model, { binaries, scale }: LinearProgramme): ProgrammeOutcome {
  const hasState = Number(model.info.get('primal_solution_status')) === highs.constants.solutionStatus.feasible
  const values = hasState ? model.getSolution().colValue : null
  const bound = Number(model.info.get('mip_dual_bound'))
  return {
    state: values && roundedState(values, binaries),
    bound: isBound(bound) ? bound * scale : -Infinity,
  }
}

/** The linearised QUBO by HiGHS, until it is proved, cancelled or out of time; it begins from the state given. */
export async function solveProgramme(
  { qubo, start, gap, seed, deadline }: SolveProgrammeInput,
  control: Control<ProgrammeProgress>,
): Promise<ProgrammeOutcome | null> {
  const bounded = untilDeadline(control, deadline)
  const highs = await loadSolver()
  const programme = linearise(qubo)
  return highs.withModel(modelOf(highs, programme), (model) => {
    model.options.set('output_flag', false)
    model.options.set('random_seed', seed % SEEDS)
    model.options.set('time_limit', secondsLeft(deadline))
    model.options.set('mip_rel_gap', 0)
    model.options.set('mip_abs_gap', gap / programme.scale)
    model.setSolution({ colValue: columnsOf(qubo, programme, start) })
    model.run(watch(highs, qubo, programme.scale, bounded))
    return outcomeOf(highs, model, programme)
  })
}
