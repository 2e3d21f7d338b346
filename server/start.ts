import { join } from 'node:path'
import type { App } from './app'
import { addressRules } from './bridge/addresses'
import { createOutbound } from './bridge/outbound'
import { migrate, openDatabase } from './database/client'
import { createBlobStore } from './database/repositories/blobs'
import { createProvider } from './identity/provider'
import type { ProviderSettings } from './identity/settings'
import { startQueue } from './jobs/queue'
import { startRunner } from './jobs/runner'
import { sweepAnswers } from './services/answered-requests'
import { sweepAttempts } from './services/attempts'
import { sweepReservations } from './services/budget'
import { sweepChallenges } from './services/challenges'
import { sweepConfirmations } from './services/confirmations'
import { sweepDeletions } from './services/deletions'
import { KeptUploads } from './services/kept-uploads'
import { sweepNews } from './services/news'
import { NewsWatch } from './services/news-watch'
import { sweepSessions } from './services/sessions'
import { sweepWorkspaces } from './services/workspace-deletion'
import { createCompute } from './workers/compute'
import { VERSION } from './version'

export interface StartOptions {
  databaseUrl?: string
  dataFolder: string
  demo: boolean
  /** Answers the folder of the bundled worker threads. */
  workersFolder: () => string
  /** Jobs run at the same time in this process; 0 leaves them to other processes. */
  concurrency: number
  /** Worker threads for background jobs; as many as there are cores where nothing is said. */
  threads?: number
  /** Networks that are not public and may be called all the same, apart by commas; none where nothing is said. */
  privateAddresses?: string
  /** Outside identity provider; none where nothing is said. */
  provider?: ProviderSettings | null
}

export interface StartedApp {
  app: App
  /** Stops taking work, hands running jobs back, closes the threads and the database, in this order. */
  close(): Promise<void>
}

const UNADOPTED_KEPT_MS = 60 * 60 * 1000
const SWEEP_MS = 30_000

/** Clears away now and then what was never adopted, what was deleted for good and what has expired. @returns how to end that */
async function keepSweeping(app: App): Promise<() => void> {
  const sweep = async (): Promise<void> => {
    app.uploads.sweep()
    await app.blobs.sweep(new Date(app.now().getTime() - UNADOPTED_KEPT_MS))
    await sweepDeletions(app)
    await sweepWorkspaces(app)
    await sweepSessions(app)
    await sweepAttempts(app)
    await sweepReservations(app)
    await sweepAnswers(app)
    await sweepConfirmations(app)
    await sweepChallenges(app)
    await sweepNews(app)
  }
  await sweep()
  const timer = setInterval(
    () => void sweep().catch((error: Error) => console.error(`sweep: ${error.message}`)),
    SWEEP_MS,
  )
  timer.unref()
  return () => clearInterval(timer)
}

/** Opens the database, applies migrations, and starts the queue and the job runner. */
export async function startApp(options: StartOptions): Promise<StartedApp> {
  const database = await openDatabase(options)
  await migrate(database)
  const now = (): Date => new Date()
  const blobs = createBlobStore(database, now)
  const compute = createCompute(options.workersFolder, options.threads)
  const queue = await startQueue(database)
  const uploads = new KeptUploads(now)
  const newsWatch = new NewsWatch(database.db, now)
  const outbound = createOutbound(addressRules(options.privateAddresses ?? ''))
  const provider = options.provider ? createProvider(options.provider) : null
  const held = { database, db: database.db, blobs, compute, queue, uploads, newsWatch, outbound, provider }
  const app: App = { ...held, now, version: VERSION, demo: options.demo }
  const stopSweeping = await keepSweeping(app)
  const runner = options.concurrency > 0 ? await startRunner(app, options.concurrency) : undefined
  return {
    app,
    async close() {
      stopSweeping()
      newsWatch.stop()
      if (runner) await runner.stop()
      else await queue.stop()
      await compute.close()
      await database.close()
    },
  }
}

/** The folder that holds the database and the demo's session password. */
export const dataFolderOf = (env: NodeJS.ProcessEnv): string => env.DATA_DIR || join(process.cwd(), '.data')
