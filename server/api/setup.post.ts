import { setupSchema } from '../../shared/schemas/session'
import { setUp } from '../services/people'

/** Creates the first workspace and its owner with the one-time code from the server's console, and signs in. */
export default definePublicRoute(async (event, app) => {
  await enter(event, app, await setUp(app, PASSWORDS, await bodyOf(event, setupSchema)), 'setup')
  setResponseStatus(event, 201)
  return { ok: true }
})
