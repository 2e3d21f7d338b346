import { randomUUID } from 'node:crypto'
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'
import { afterAll } from 'vitest'
import type { Actor, App } from '../../server/app'
import type { JobRow } from '../../server/database/repositories/jobs'
import { findJob } from '../../server/database/repositories/jobs'
import { createAccount, createWorkspace } from '../../server/services/people'
import { uploadProblem } from '../../server/services/problem-upload'
import { createMachine } from '../../server/services/machine-creation'
import type { StartedApp } from '../../server/start'
import { startApp } from '../../server/start'
import { createMachineSchema } from '../../shared/schemas/machines'
import { uploadProblemSchema } from '../../shared/schemas/problems'
import { emptyFolder } from './folders'
import { until } from './server'

const OVER = ['done', 'failed', 'cancelled']

/** Services, queue and threads in this process, on a database of their own. */
export interface TestApp extends StartedApp {
  actor: Actor
  problem(text: string): Promise<string>
  machine(family: Record<string, unknown>): Promise<string>
  /** Waits for a job to be over. */
  finished(jobId: string): Promise<JobRow>
  /** Closes this one and opens its database again. */
  restarted(threads: number): Promise<TestApp>
}

let bundled: Promise<string> | undefined
// Registered before any hook of a test file, so it runs after them.
afterAll(async () => {
  if (bundled) rmSync(await bundled, { recursive: true })
})

/** The thread entry as the product bundles it (modules/workers.ts), where it finds its packages. */
async function bundleThread(): Promise<string> {
  const cache = fileURLToPath(new URL('../../node_modules/.cache', import.meta.url))
  mkdirSync(cache, { recursive: true })
  const outdir = mkdtempSync(join(cache, 'espalier-threads-'))
  const entry = fileURLToPath(new URL('../../server/workers/thread.ts', import.meta.url))
  await build({
    entryPoints: { thread: entry },
    outdir,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    platform: 'node',
    format: 'esm',
    external: ['piscina', 'highs'],
  })
  return outdir
}

/**
 * @param threads for background jobs
 * @param databaseUrl of a server, instead of the embedded database
 */
export async function startTestApp(
  threads: number,
  dataFolder = emptyFolder(),
  member?: Actor,
  databaseUrl?: string,
): Promise<TestApp> {
  const folder = await (bundled ??= bundleThread())
  const workersFolder = () => folder
  const started = await startApp({ databaseUrl, dataFolder, demo: false, workersFolder, concurrency: 2, threads })
  const { app } = started
  const actor = member ?? (await firstMember(app))
  return {
    ...started,
    actor,
    problem: async (text) => {
      const file = { name: 'problem.txt', bytes: Buffer.from(text) }
      const { id } = await uploadProblem(app, actor, file, uploadProblemSchema.parse({ name: 'Test' }))
      return id!
    },
    machine: async (family) => {
      const input = createMachineSchema.parse({ name: `Machine ${randomUUID()}`, family })
      return (await createMachine(app, actor, input)).id
    },
    finished: (jobId) =>
      until(
        async () => {
          const job = await findJob(app.db, jobId)
          return job && OVER.includes(job.status) && job
        },
        60,
        `the end of job ${jobId}`,
      ),
    restarted: async (again) => {
      await started.close()
      return startTestApp(again, dataFolder, actor, databaseUrl)
    },
  }
}

function firstMember(app: App): Promise<Actor> {
  return app.db.transaction(async (tx) => {
    const workspaceId = await createWorkspace(app, tx, 'Test')
    const account = { email: 'developer@test.example', name: 'Developer', passwordHash: '-', workspaceId }
    const userId = await createAccount(app, tx, { ...account, roles: ['developer'] })
    return { userId, workspaceId }
  })
}
