import type { PlannedTry } from '../../../shared/engine/embedding/plan'
import type { TryResult } from '../../../shared/engine/embedding/tries'

export interface Spread {
  plan: readonly PlannedTry[]
  /** Tries that run at the same time. */
  threads: number
  /** Asks all tries to end with what they have. */
  signal: AbortSignal
  /** Runs one try; answers null when there was no time left for it. */
  run: (planned: PlannedTry, signal: AbortSignal) => Promise<TryResult | null>
}

/**
 * Runs the tries of a plan in order of their numbers, several at a time. Once one has reached the target those after it
 * are ended, while those before it go on: which embedding is kept does not depend on how many run at the same time.
 * @returns the results in the order in which they came; when a try throws, its error once the others have ended
 */
export async function spreadTries({ plan, threads, signal, run }: Spread): Promise<TryResult[]> {
  const results: TryResult[] = []
  const atWork = new Map<number, AbortController>()
  let next = 0
  let lastCounted = Infinity
  const endAfter = (tryNumber: number): void => {
    lastCounted = Math.min(lastCounted, tryNumber)
    for (const [number, controller] of atWork) if (number > lastCounted) controller.abort()
  }
  const endAll = (): void => endAfter(0)
  const takeTries = async (): Promise<void> => {
    while (next < plan.length && plan[next]!.tryNumber <= lastCounted) {
      const planned = plan[next++]!
      const controller = new AbortController()
      atWork.set(planned.tryNumber, controller)
      const result = await run(planned, controller.signal).finally(() => atWork.delete(planned.tryNumber))
      if (!result) return
      results.push(result)
      if (result.stopped === 'target reached') endAfter(planned.tryNumber)
    }
  }
  if (signal.aborted) return results
  signal.addEventListener('abort', endAll)
  const takers = Array.from({ length: Math.min(threads, plan.length) }, () =>
    takeTries().catch((error: unknown) => {
      endAll()
      throw error
    }),
  )
  const ends = await Promise.allSettled(takers)
  signal.removeEventListener('abort', endAll)
  for (const end of ends) if (end.status === 'rejected') throw end.reason
  return results
}
