import { health } from '../services/health'

/** `{status, database, queue, version}`; 503 when one of them does not answer. */
export default definePublicRoute(async (event, app) => {
  const view = await health(app)
  if (view.status !== 'ok') setResponseStatus(event, 503)
  return view
})
