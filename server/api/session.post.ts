import { signInSchema } from '../../shared/schemas/session'
import { signIn } from '../services/sign-in'

/**
 * Signs in: `{email, password}` → 200 with the session cookie; 401 when they do not belong together; 429 with `Retry-After`
 * in seconds after too many attempts.
 */
export default definePublicRoute(async (event, app) => {
  const input = await bodyOf(event, signInSchema)
  const later = (work: Promise<void>): void => event.waitUntil(work)
  await enter(event, app, await signIn(app, PASSWORDS, input, addressOf(event), later), 'password')
  return { ok: true }
})
