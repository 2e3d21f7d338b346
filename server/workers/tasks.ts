import type { Control } from '../../shared/engine/control'
import { advise } from './tasks/advise'
import { analyse } from './tasks/analyse'
import { annealPart } from './tasks/anneal-part'
import { checkEmbedding } from './tasks/check-embedding'
import { compareProblems } from './tasks/compare-problems'
import { completeCapacity } from './tasks/complete-capacity'
import { eliminatePart } from './tasks/eliminate-part'
import { energies } from './tasks/energies'
import { enumeratePart } from './tasks/enumerate-part'
import { countPartBreaks, judgeBreaks } from './tasks/part-breaks'
import { makeFabric } from './tasks/make-fabric'
import { measureChains } from './tasks/measure-chains'
import { planOptimum } from './tasks/plan-optimum'
import { findDamage } from './tasks/find-damage'
import { liftStates } from './tasks/lift-states'
import { listSolutions } from './tasks/list-solutions'
import { planSearch } from './tasks/plan-search'
import { presolve } from './tasks/presolve'
import { proveInfeasible } from './tasks/prove-infeasible'
import { readMachineGraph } from './tasks/read-graph'
import { listRejectedLines, readProblemFile } from './tasks/read-problem'
import { readSamplesFile } from './tasks/read-samples'
import { readTemperature } from './tasks/read-temperature'
import { recogniseGroups } from './tasks/recognise-groups'
import { rehearse } from './tasks/rehearse'
import { runTry } from './tasks/run-try'
import { scanStrength } from './tasks/scan-strength'
import { solveProgramme } from './tasks/solve-programme'
import { solveQuickParts } from './tasks/solve-quick-parts'
import { sparsity } from './tasks/sparsity'
import { structureDetails } from './tasks/structure-details'
import { countBreaks, decodeRows } from './tasks/summarise'
import { writeBundle } from './tasks/write-bundle'
import { writeMachineGraph } from './tasks/write-graph'
import { writeProblemFile } from './tasks/write-problem'
import { writeSamplesFile } from './tasks/write-samples'

/** Everything a worker thread can do: structured-cloneable input, control, structured-cloneable output. */
export const TASKS = {
  advise,
  analyse,
  annealPart,
  checkEmbedding,
  compareProblems,
  completeCapacity,
  countPartBreaks,
  eliminatePart,
  energies,
  judgeBreaks,
  listRejectedLines,
  enumeratePart,
  findDamage,
  makeFabric,
  measureChains,
  planOptimum,
  liftStates,
  listSolutions,
  planSearch,
  presolve,
  proveInfeasible,
  readMachineGraph,
  readProblemFile,
  readSamplesFile,
  readTemperature,
  recogniseGroups,
  rehearse,
  runTry,
  scanStrength,
  solveProgramme,
  solveQuickParts,
  sparsity,
  structureDetails,
  countBreaks,
  decodeRows,
  writeBundle,
  writeMachineGraph,
  writeProblemFile,
  writeSamplesFile,
}

type Tasks = typeof TASKS
export type TaskName = keyof Tasks
export type TaskInput<N extends TaskName> = Parameters<Tasks[N]>[0]
export type TaskOutput<N extends TaskName> = Awaited<ReturnType<Tasks[N]>>
export type TaskProgress<N extends TaskName> = Parameters<Tasks[N]>[1] extends Control<infer P> ? P : never
