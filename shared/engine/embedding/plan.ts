import type { Method } from './method'
import type { EmbeddingTask } from './task'
import type { PlannedTry } from './tries'

/** The tries of a search, in order of their numbers. They are independent: any number may run at the same time. */
export function planTries(
  _task: EmbeddingTask,
  { method, tries }: { method: Method | 'auto'; tries: number },
): PlannedTry[] {
  return Array.from({ length: tries }, (_, i) => ({ tryNumber: i + 1, method: method === 'auto' ? 'search' : method }))
}
