import type { Control } from '../../../shared/engine/control'
import type { PlannedTry } from '../../../shared/engine/embedding/plan'
import type { SearchProgress } from '../../../shared/engine/embedding/progress'
import type { EmbeddingTask } from '../../../shared/engine/embedding/task'
import type { TryResult, TrySettings } from '../../../shared/engine/embedding/tries'
import { runTry as runOne } from '../../../shared/engine/embedding/tries'
import type { SearchClock } from '../search-clock'
import { secondsOn, startClock } from '../search-clock'

export interface RunTryInput {
  task: EmbeddingTask
  planned: PlannedTry
  /** The time limit is of all tries of the search together, on its clock. */
  settings: TrySettings
  clock: SearchClock
}

/**
 * Runs one try of a search, with `firstSeconds` on the clock of the search; null when its time was over before this try
 * got a thread.
 */
export function runTry(
  { task, planned, settings, clock }: RunTryInput,
  control: Control<SearchProgress>,
): TryResult | null {
  startClock(clock)
  const before = secondsOn(clock)
  const timeLimitSeconds = settings.timeLimitSeconds - before
  if (timeLimitSeconds <= 0) return null
  const result = runOne(task, planned, { ...settings, timeLimitSeconds }, control)
  const { firstSeconds } = result
  return { ...result, firstSeconds: firstSeconds === null ? null : before + firstSeconds }
}
