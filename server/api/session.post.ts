import { signInSchema } from '../../shared/schemas/session'
import { signIn } from '../services/people'

/** Signs in: `{email, password}` → 200 with the session cookie; 401 when they do not belong together. */
export default definePublicRoute(async (event, app) => {
  const { email, password } = await bodyOf(event, signInSchema)
  await enter(event, app, await signIn(app, PASSWORDS, email, password))
  return { ok: true }
})
