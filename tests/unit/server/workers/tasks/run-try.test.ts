import { expect, test } from 'vitest'
import { newSearchClock, secondsOn } from '../../../../../server/workers/search-clock'
import { runTry } from '../../../../../server/workers/tasks/run-try'
import type { SearchOptions } from '../../../../../shared/engine/embedding/search'
import { DEFAULTS } from '../../../../../shared/engine/embedding/search'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'

const control = { now: () => performance.now() / 1000, cancelled: () => false, report: () => {} }
/** A triangle onto a square with one diagonal. */
const task = {
  problem: graphFromEdges(3, [0, 1, 0, 2, 1, 2]),
  machine: graphFromEdges(4, [0, 1, 1, 2, 2, 3, 0, 3, 0, 2]),
  usable: new Uint8Array(4).fill(1),
  segments: null,
  family: null,
  start: null,
}
const settings: SearchOptions = { ...DEFAULTS, timeLimitSeconds: 60 }
const planned = { tryNumber: 1, method: 'search' as const, share: 1 }

test('the clock of a search starts with the first of its tries that gets a thread', () => {
  const clock = newSearchClock()
  expect(secondsOn(clock)).toBe(0)
  const result = runTry({ task, planned, settings, clock }, control)!
  expect(result.embedding).not.toBeNull()
  expect(result.firstSeconds).toBeGreaterThan(0)
  expect(result.firstSeconds).toBeLessThan(secondsOn(clock))
})

test('the seconds to a first embedding count from the start of the search', () => {
  const clock = newSearchClock()
  Atomics.store(clock, 0, process.hrtime.bigint() - 20_000_000_000n)
  const { firstSeconds } = runTry({ task, planned, settings, clock }, control)!
  expect(firstSeconds).toBeGreaterThan(20)
  expect(firstSeconds).toBeLessThan(secondsOn(clock))
})

test('a try for which no time is left does not run', () => {
  const clock = newSearchClock()
  Atomics.store(clock, 0, process.hrtime.bigint() - 60_000_000_001n)
  expect(runTry({ task, planned, settings, clock }, control)).toBeNull()
})
