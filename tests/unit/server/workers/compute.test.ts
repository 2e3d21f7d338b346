import { mkdtemp, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, expect, test } from 'vitest'
import type { Compute } from '../../../../server/workers/compute'
import { createCompute } from '../../../../server/workers/compute'

/** Stands in for the bundled entry: tries and rehearsals last until they are cancelled, everything else is at once. */
const THREAD = `
export default function run({ name, input, port, cancel }) {
  const flag = new Int32Array(cancel)
  Atomics.store(flag, 1, 1)
  port.postMessage('begun')
  if (name === 'runTry' || name === 'rehearse') while (Atomics.load(flag, 0) === 0) Atomics.wait(flag, 0, 0, 20)
  port.close()
  return { name, input }
}`

let compute: Compute | undefined
afterEach(async () => compute?.close())

async function start(threads: number): Promise<Compute> {
  const folder = await mkdtemp(join(tmpdir(), 'espalier-threads-'))
  await writeFile(join(folder, 'thread.mjs'), THREAD)
  return (compute = createCompute(() => folder, threads))
}

test('what a person waits for does not queue behind the tries and rehearsals that fill the threads', async () => {
  const { run } = await start(1)
  const cancel = new AbortController()
  const long = [
    run('runTry', {} as never, { signal: cancel.signal }),
    run('rehearse', {} as never, { signal: cancel.signal }),
  ]
  expect(await run('countBreaks', { seed: 7 } as never)).toEqual({ name: 'countBreaks', input: { seed: 7 } })
  cancel.abort()
  expect(await Promise.all(long)).toHaveLength(2)
})

test('a task that is cancelled before it starts is told so', async () => {
  const { run } = await start(1)
  expect(await run('runTry', {} as never, { signal: AbortSignal.abort() })).toMatchObject({ name: 'runTry' })
})

test('a task that no thread has taken answers at once, if it may, when it is cancelled', async () => {
  const { run } = await start(1)
  const [first, second] = [new AbortController(), new AbortController()]
  const atWork = run('rehearse', {} as never, { signal: first.signal })
  const waiting = run('runTry', {} as never, { signal: second.signal, unbegun: null })
  second.abort()
  expect(await waiting).toBeNull()
  first.abort()
  expect(await atWork).toMatchObject({ name: 'rehearse' })
})

test('a task at work ends by itself when it is cancelled', async () => {
  const { run } = await start(1)
  const cancel = new AbortController()
  const onProgress = (): void => cancel.abort()
  expect(await run('runTry', {} as never, { signal: cancel.signal, unbegun: null, onProgress })).toMatchObject({
    name: 'runTry',
  })
})
