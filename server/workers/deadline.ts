import type { Control } from '../../shared/engine/control'
import type { SearchClock } from './search-clock'
import { secondsOn, startClock } from './search-clock'

/** Up to when a task may work, on a clock that it shares with others. */
export interface Deadline {
  readonly clock: SearchClock
  readonly seconds: number
}

/** The control of a task that also takes the deadline for a cancellation. Starts the clock unless it runs already. */
export function untilDeadline<P>(control: Control<P>, { clock, seconds }: Deadline): Control<P> {
  startClock(clock)
  return { ...control, cancelled: () => control.cancelled() || secondsOn(clock) >= seconds }
}

/** Seconds that are left; 0 when there are none. */
export const secondsLeft = ({ clock, seconds }: Deadline): number => Math.max(0, seconds - secondsOn(clock))
