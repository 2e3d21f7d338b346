import { isAlive } from '../database/client'

/** `{status, database, queue, version}`; 503 when the database does not answer. */
export default definePublicRoute(async (event, app) => {
  const database = await isAlive(app.db)
  if (!database) setResponseStatus(event, 503)
  return {
    status: database ? 'ok' : 'failing',
    database: database ? 'ok' : 'failing',
    queue: app.queue.running() ? 'ok' : 'stopped',
    version: app.version,
  }
})
