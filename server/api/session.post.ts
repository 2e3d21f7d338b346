import { signInSchema } from '../../shared/schemas/session'
import { signIn } from '../services/people'

/** Signs in: `{email, password}` → 200 with the session cookie; 401 when they do not belong together. */
export default definePublicRoute(async (event, app) => {
  const { email, password } = await bodyOf(event, signInSchema)
  const actor = await signIn(app, PASSWORDS, email, password)
  await setUserSession(event, { user: { id: actor.userId, workspaceId: actor.workspaceId } })
  return { ok: true }
})
