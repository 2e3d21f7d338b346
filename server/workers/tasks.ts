import type { Control } from '../../shared/engine/control'
import { energies } from './tasks/energies'
import { search } from './tasks/search'
import { readProblemFile } from './tasks/read-problem'
import { readSamplesFile } from './tasks/read-samples'
import { rehearse } from './tasks/rehearse'
import { summarise } from './tasks/summarise'
import { writeProblemFile } from './tasks/write-problem'
import { writeSamplesFile } from './tasks/write-samples'

/** Everything a worker thread can do: structured-cloneable input, control, structured-cloneable output. */
export const TASKS = {
  energies,
  readProblemFile,
  readSamplesFile,
  rehearse,
  search,
  summarise,
  writeProblemFile,
  writeSamplesFile,
}

type Tasks = typeof TASKS
export type TaskName = keyof Tasks
export type TaskInput<N extends TaskName> = Parameters<Tasks[N]>[0]
export type TaskOutput<N extends TaskName> = ReturnType<Tasks[N]>
export type TaskProgress<N extends TaskName> = Parameters<Tasks[N]>[1] extends Control<infer P> ? P : never
