import { expect, test } from 'vitest'
import { SearchMonitor } from '../../../../../server/jobs/search/search-monitor'
import type { SearchProgress } from '../../../../../shared/engine/embedding/progress'

const planned = (tryNumber: number) => ({ tryNumber, method: 'search' as const, share: 1 })

const progressOf = (tryNumber: number, rest: Partial<SearchProgress> = {}): SearchProgress => ({
  method: 'search',
  tryNumber,
  phase: 'rerouting',
  fraction: 0,
  overlap: 4,
  longestChain: null,
  qubitsUsed: null,
  changed: 0,
  seconds: 0,
  ...rest,
})

test('puts tries at work and tries that are over together', () => {
  const monitor = new SearchMonitor(4, 'longest chain', 100)
  for (const tryNumber of [1, 2]) monitor.began(planned(tryNumber))
  expect(monitor.report(progressOf(1, { overlap: 9 }), 1)).toMatchObject({ tryNumber: 1, running: 2, overlap: 9 })
  const second = monitor.report(progressOf(2, { fraction: 0.5, overlap: 0, longestChain: 6, qubitsUsed: 40 }), 2)
  expect(second).toMatchObject({ tries: 4, longestChain: 6, qubitsUsed: 40, seconds: 2 })
  expect(monitor.ended(planned(1), { longest: 5, total: 50, changed: 0 }, 2.5)).toMatchObject({
    running: 1,
    longestChain: 5,
  })
  monitor.began(planned(3))
  const third = monitor.report(progressOf(3, { overlap: 7 }), 3)
  expect(third).toMatchObject({ longestChain: 5, qubitsUsed: 50, overlap: 7 })
  expect(monitor.fraction).toBe(1.5 / 4)
  expect(third.trace).toEqual([
    { seconds: 1, overlap: 9, longestChain: null, qubitsUsed: null },
    { seconds: 2, overlap: 0, longestChain: 6, qubitsUsed: 40 },
    { seconds: 2.5, overlap: 0, longestChain: 5, qubitsUsed: 50 },
    { seconds: 3, overlap: 0, longestChain: 5, qubitsUsed: 50 },
  ])
  expect(monitor.message(third)).toBe(
    '1 of 4 tries done, 2 at work, rerouting, overlap 7; best so far: longest chain 5, 50 qubits',
  )
})

test('compares by the objective', () => {
  const monitor = new SearchMonitor(2, 'total qubits', 100)
  expect(monitor.ended(planned(1), { longest: 6, total: 40, changed: 0 }, 1)).toBeNull()
  monitor.ended(planned(2), { longest: 5, total: 50, changed: 0 }, 1)
  expect(monitor.report(progressOf(2), 1)).toMatchObject({ longestChain: 6, qubitsUsed: 40 })
})

test('prefers a repair that changed fewer chains', () => {
  const monitor = new SearchMonitor(2, 'longest chain', 100)
  monitor.began(planned(1))
  monitor.report(progressOf(1, { longestChain: 6, qubitsUsed: 1040, changed: 1 }), 1)
  const shorter = monitor.report(progressOf(1, { longestChain: 5, qubitsUsed: 30, changed: 2 }), 2)
  expect(shorter).toMatchObject({ longestChain: 6, qubitsUsed: 1040 })
  expect(monitor.message(shorter)).toContain('longest chain 6, 1\u202f040 qubits')
})

test('never falls, and is done when the time is over', () => {
  const monitor = new SearchMonitor(10, 'longest chain', 8)
  monitor.began(planned(1))
  const fractions = [0, 6, 2, 8, 9].map((seconds) => {
    monitor.report(progressOf(1), seconds)
    return monitor.fraction
  })
  expect(fractions).toEqual([0, 0.75, 0.75, 1, 1])
})
