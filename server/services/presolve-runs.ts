import type { PresolveProgress } from '../../shared/engine/problem/presolve/presolve'
import type { App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import type { PresolveOutput } from '../workers/tasks/presolve'
import type { ProblemData } from './problem-data'
import { problemData } from './problems'
import { Recent } from './recent'

/** One pre-solve at work, shared by all who ask for it meanwhile. */
interface Run {
  readonly result: Promise<PresolvedProblem>
  readonly stop: AbortController
  progress: PresolveProgress
  waiting: number
}

export interface PresolvedProblem extends PresolveOutput {
  data: ProblemData
}

/** Problems with equal fingerprints have equal reductions. */
const finished = new Recent<PresolvedProblem>(8)
const running = new Map<string, Run>()

function begin(app: App, row: ProblemRow): Run {
  const stop = new AbortController()
  const work = async (): Promise<PresolvedProblem> => {
    const data = await problemData(app, row)
    const { problem, form } = data
    const onProgress = (progress: PresolveProgress): void => void (run.progress = progress)
    const output = await app.compute.run('presolve', { problem, form }, { signal: stop.signal, onProgress })
    return { ...output, data }
  }
  const run: Run = {
    result: work().finally(() => {
      if (running.get(row.fingerprint) === run) running.delete(row.fingerprint)
    }),
    stop,
    progress: { phase: 'neighbours', left: row.variables, round: 0 },
    waiting: 0,
  }
  running.set(row.fingerprint, run)
  return run
}

/** @param signal that who asked is gone; the work is stopped when nobody waits for it any more */
export async function presolved(app: App, row: ProblemRow, signal?: AbortSignal): Promise<PresolvedProblem> {
  const known = finishedPresolve(row)
  if (known) return known
  const run = running.get(row.fingerprint) ?? begin(app, row)
  run.waiting++
  const leave = (): void => {
    if (--run.waiting > 0) return
    running.delete(row.fingerprint)
    run.stop.abort()
  }
  signal?.addEventListener('abort', leave, { once: true })
  if (signal?.aborted) leave()
  try {
    const result = await run.result
    return result.reduction.isStopped ? result : finished.get(row.fingerprint, () => result)
  } finally {
    signal?.removeEventListener('abort', leave)
  }
}

/** What was worked out a while ago. */
export const finishedPresolve = (row: ProblemRow): PresolvedProblem | undefined => finished.peek(row.fingerprint)

/** How far a pre-solve of this problem is that is at work in this process. */
export const runningPresolve = (row: ProblemRow): PresolveProgress | undefined => running.get(row.fingerprint)?.progress
