import { Piscina } from 'piscina'
import { availableParallelism } from 'node:os'
import { join } from 'node:path'
import type { MessagePort } from 'node:worker_threads'
import { MessageChannel } from 'node:worker_threads'
import { FLAGS } from './flags'
import type { TaskInput, TaskName, TaskOutput, TaskProgress } from './tasks'

export interface RunOptions<N extends TaskName> {
  /** Asks the task to stop early; it then answers what it has. */
  signal?: AbortSignal
  /** The answer when the signal comes before a thread took the task. Without it the task is run even then. */
  unbegun?: TaskOutput<N>
  onProgress?: (progress: TaskProgress<N>) => void
}

/** Runs engine work off the main thread. */
export interface Compute {
  /** How many tasks of background jobs run at the same time. */
  readonly threads: number
  run<N extends TaskName>(name: N, input: TaskInput<N>, options?: RunOptions<N>): Promise<TaskOutput<N>>
  close(): Promise<void>
}

/** What a thread receives: see thread.ts. */
export interface ThreadMessage {
  name: TaskName
  input: unknown
  port: MessagePort
  /** See flags.ts. */
  cancel: SharedArrayBuffer
}

/** Tasks of background jobs. They may hold a thread for an hour, so what a person waits for has threads of its own. */
const LONG: ReadonlySet<TaskName> = new Set<TaskName>([
  'annealPart',
  'eliminatePart',
  'enumeratePart',
  'measureChains',
  'rehearse',
  'runTry',
  'scanStrength',
  'solveProgramme',
  'solveQuickParts',
])

/**
 * Two pools of worker threads over the bundled thread entry, each opened at its first use: long tasks, and the others.
 * @param workersFolder answers the folder that holds thread.mjs; asked at first use, when the final paths are known
 */
export function createCompute(workersFolder: () => string, threads = availableParallelism()): Compute {
  const pools = new Map<boolean, Piscina>()
  const poolFor = (name: TaskName): Piscina => {
    const long = LONG.has(name)
    const filename = join(workersFolder(), 'thread.mjs')
    const pool = pools.get(long) ?? new Piscina({ filename, minThreads: 1, maxThreads: threads, idleTimeout: 60_000 })
    pools.set(long, pool)
    return pool
  }
  return {
    threads,
    async run(name, input, options = {}) {
      const flags = new Int32Array(new SharedArrayBuffer(8))
      const withdrawal = new AbortController()
      const stop = (): void => {
        Atomics.store(flags, FLAGS.stop, 1)
        if ('unbegun' in options && Atomics.load(flags, FLAGS.begun) === 0) withdrawal.abort()
      }
      if (options.signal?.aborted) stop()
      options.signal?.addEventListener('abort', stop)
      const { port1, port2 } = new MessageChannel()
      port1.on('message', (progress) => options.onProgress?.(progress))
      try {
        const message: ThreadMessage = { name, input, port: port2, cancel: flags.buffer }
        return await poolFor(name).run(message, { transferList: [port2], signal: withdrawal.signal })
      } catch (error) {
        if (withdrawal.signal.aborted) return options.unbegun!
        throw error
      } finally {
        options.signal?.removeEventListener('abort', stop)
        port1.close()
      }
    },
    async close() {
      await Promise.all([...pools.values()].map((pool) => pool.destroy()))
      pools.clear()
    },
  }
}
