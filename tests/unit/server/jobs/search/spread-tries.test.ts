import { expect, test } from 'vitest'
import { spreadTries } from '../../../../../server/jobs/search/spread-tries'
import type { StopReason } from '../../../../../shared/engine/embedding/progress'
import type { TryResult } from '../../../../../shared/engine/embedding/tries'

const planOf = (tries: number) =>
  Array.from({ length: tries }, (_, k) => ({ tryNumber: k + 1, method: 'search' as const, share: 1 }))

const resultOf = (tryNumber: number, stopped: StopReason | null = null): TryResult => ({
  tryNumber,
  method: 'search',
  share: 1,
  embedding: null,
  quality: null,
  partial: null,
  stopped,
  seconds: 0,
  firstSeconds: null,
})

/** Tries that last until they are let go, and end as cancelled when they are told to. */
function stage() {
  const letGo = new Map<number, (result: TryResult | null | Error) => void>()
  const run = ({ tryNumber }: { tryNumber: number }, signal: AbortSignal): Promise<TryResult | null> =>
    new Promise((resolve, reject) => {
      letGo.set(tryNumber, (result) => {
        letGo.delete(tryNumber)
        if (result instanceof Error) reject(result)
        else resolve(result)
      })
      signal.addEventListener('abort', () => letGo.get(tryNumber)?.(resultOf(tryNumber, 'cancelled')))
    })
  const end = async (tryNumber: number, result: TryResult | null | Error = resultOf(tryNumber)): Promise<void> => {
    letGo.get(tryNumber)!(result)
    await new Promise((resolve) => setImmediate(resolve))
  }
  return { run, end, atWork: () => [...letGo.keys()].sort((a, b) => a - b) }
}

const numbersOf = (results: TryResult[]) => results.map(({ tryNumber }) => tryNumber)

test('as many tries run at once as there are threads, in order of their numbers', async () => {
  const { run, end, atWork } = stage()
  const spread = spreadTries({ plan: planOf(4), threads: 2, signal: new AbortController().signal, run })
  expect(atWork()).toEqual([1, 2])
  await end(2)
  expect(atWork()).toEqual([1, 3])
  await end(1)
  await end(4)
  await end(3)
  expect(numbersOf(await spread)).toEqual([2, 1, 4, 3])
})

test('a try that reaches the target ends those after it, and lets those before it go on', async () => {
  const { run, end, atWork } = stage()
  const spread = spreadTries({ plan: planOf(6), threads: 3, signal: new AbortController().signal, run })
  await end(2, resultOf(2, 'target reached'))
  expect(atWork()).toEqual([1])
  await end(1)
  const results = await spread
  expect(numbersOf(results).sort()).toEqual([1, 2, 3])
  expect(results.find(({ tryNumber }) => tryNumber === 3)!.stopped).toBe('cancelled')
})

test('an earlier try that reaches the target later counts instead', async () => {
  const { run, end, atWork } = stage()
  const spread = spreadTries({ plan: planOf(9), threads: 3, signal: new AbortController().signal, run })
  await end(3, resultOf(3, 'target reached'))
  expect(atWork()).toEqual([1, 2])
  await end(1, resultOf(1, 'target reached'))
  expect(numbersOf(await spread)).toEqual([3, 1, 2])
})

test('cancelling ends all tries with what they have and begins none', async () => {
  const { run } = stage()
  const cancel = new AbortController()
  const spread = spreadTries({ plan: planOf(5), threads: 2, signal: cancel.signal, run })
  cancel.abort()
  const results = await spread
  expect(results.map(({ tryNumber, stopped }) => [tryNumber, stopped])).toEqual([
    [1, 'cancelled'],
    [2, 'cancelled'],
  ])
  expect(await spreadTries({ plan: planOf(5), threads: 2, signal: cancel.signal, run })).toEqual([])
})

test('no try begins once there is no time left for one', async () => {
  const { run, end, atWork } = stage()
  const spread = spreadTries({ plan: planOf(5), threads: 1, signal: new AbortController().signal, run })
  await end(1, resultOf(1, 'timed out'))
  await end(2, null)
  expect(atWork()).toEqual([])
  expect(numbersOf(await spread)).toEqual([1])
})

test('an error of one try ends the others before it is told', async () => {
  const { run, end, atWork } = stage()
  const spread = spreadTries({ plan: planOf(5), threads: 2, signal: new AbortController().signal, run })
  const told = expect(spread).rejects.toThrow('broken')
  await end(2, new Error('broken'))
  await told
  expect(atWork()).toEqual([])
})
