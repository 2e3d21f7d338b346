import { availableParallelism } from 'node:os'
import { dirname, join } from 'node:path'
import { dataFolderOf, startApp } from './start'

/**
 * Entry of `node .output/server/worker.mjs`: a process that only takes jobs, sharing the queue in a PostgreSQL server
 * with the web process and with any number of its like.
 */
async function main(): Promise<void> {
  if (!process.env.DATABASE_URL) {
    console.error(
      'Extra workers share a PostgreSQL server. Set DATABASE_URL; the embedded database belongs to one process only.',
    )
    process.exit(1)
  }
  const started = await startApp({
    databaseUrl: process.env.DATABASE_URL,
    dataFolder: dataFolderOf(process.env),
    demo: false,
    workersFolder: () => join(dirname(process.argv[1]!), 'workers'),
    concurrency: process.env.JOBS === undefined ? availableParallelism() : Number(process.env.JOBS),
  })
  console.log(`Espalier ${started.app.version} worker ${process.pid} takes jobs.`)
  const close = (): void => void started.close().then(() => process.exit(0))
  process.once('SIGTERM', close)
  process.once('SIGINT', close)
}

main().catch((error: Error) => {
  console.error(`The worker could not start: ${error.message}`)
  process.exit(1)
})
