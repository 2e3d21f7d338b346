import { sizeOf } from '../graph/graph'
import type { Method } from './method'
import type { EmbeddingTask } from './task'

/** One try of a plan, independent of all others. */
export interface PlannedTry {
  /** From 1; also the number of the try's stream of random numbers. */
  readonly tryNumber: number
  readonly method: Method
  /** Its share of the time limit, in seconds. */
  readonly share: number
}

export const PLAN = {
  /** Mean number of interactions from which lines are worth a try, and beyond which searching chains is not … */
  linesFromDegree: 4,
  searchToDegree: 9,
  /** … unless the problem is so small that it costs next to nothing. */
  alwaysSearched: 30,
  /** Share of all pairs that interact from which a template is worth a try, and from which nothing else is. */
  templateFromDensity: 0.12,
  completeFromDensity: 0.9,
} as const

/** Whether the machine is made of segments rather than points. */
function hasLines({ segments }: EmbeddingTask): boolean {
  if (!segments) return false
  for (let k = 0; k < segments.length; k += 4)
    if (segments[k] !== segments[k + 2] || segments[k + 1] !== segments[k + 3]) return true
  return false
}

/** The methods that fit the problem and the machine, the most promising first. */
function fittingMethods(task: EmbeddingTask): Method[] {
  const { order } = task.problem
  const interactions = sizeOf(task.problem)
  const degree = order > 0 ? (2 * interactions) / order : 0
  const density = order > 1 ? degree / (order - 1) : 0
  const lines = hasLines(task)
  const methods: Method[] = []
  if (density >= PLAN.templateFromDensity && (lines || task.family?.kind === 'king')) methods.push('template')
  const complete = methods.length > 0 && density >= PLAN.completeFromDensity
  if (lines && degree >= PLAN.linesFromDegree && !complete) methods.push('lines')
  if (methods.length === 0 || order <= PLAN.alwaysSearched || (degree <= PLAN.searchToDegree && !complete))
    methods.push('search')
  return methods
}

/**
 * The tries of a search, in the order of their numbers; `auto` gives every method that fits as many. They are
 * independent: any number may run at the same time.
 */
export function planTries(
  task: EmbeddingTask,
  { method, tries, timeLimitSeconds }: { method: Method | 'auto'; tries: number; timeLimitSeconds: number },
): PlannedTry[] {
  const methods = method === 'auto' ? fittingMethods(task) : [method]
  return Array.from({ length: tries * methods.length }, (_, i) => ({
    tryNumber: i + 1,
    method: methods[i % methods.length]!,
    share: timeLimitSeconds / (tries * methods.length),
  }))
}
