/** The moment at which the first try of a search got a thread: one number in memory that all its tries see. */
export type SearchClock = BigInt64Array<SharedArrayBuffer>

/** A clock that has not been started. */
export const newSearchClock = (): SearchClock => new BigInt64Array(new SharedArrayBuffer(8))

/** Starts the clock unless it runs already. Node's high-resolution time is the same in all threads. */
export function startClock(clock: SearchClock): void {
  Atomics.compareExchange(clock, 0, 0n, process.hrtime.bigint())
}

/** Seconds since the start; 0 before it. */
export function secondsOn(clock: SearchClock): number {
  const start = Atomics.load(clock, 0)
  return start === 0n ? 0 : Number(process.hrtime.bigint() - start) / 1e9
}
