/** Work that is looked for again and again as long as this process lives. */
export interface Rounds {
  /** Ends after the round in hand. */
  stop(): Promise<void>
}

/**
 * Goes round every so many milliseconds, one round at a time; a fault is written to the console and the next round tries
 * again.
 * @param work is told whether it was stopped, to leave off between two pieces of a round
 */
export function keepGoingRound(name: string, everyMs: number, work: (stopped: () => boolean) => Promise<void>): Rounds {
  let stopped = false
  let round: Promise<void> = Promise.resolve()
  let busy = false
  const look = async (): Promise<void> => {
    busy = true
    await work(() => stopped).catch((error: Error) => console.error(`${name}: ${error.message}`))
    busy = false
  }
  const timer = setInterval(() => {
    if (!busy) round = look()
  }, everyMs)
  timer.unref()
  return {
    async stop() {
      stopped = true
      clearInterval(timer)
      await round
    },
  }
}
