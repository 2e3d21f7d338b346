import { usedPasskeySchema } from '../../../shared/schemas/passkeys'
import { signInByPasskey } from '../../services/passkey-sign-in'

/**
 * Signs in with a passkey: `{challengeId, credential}` → 200 with the session cookie; 401 when it opens no account; 422 when
 * what it answers was asked too long ago, or answered before; 429 with `Retry-After` in seconds after too many attempts.
 */
export default definePublicRoute(async (event, app) => {
  const used = await bodyOf(event, usedPasskeySchema)
  const later = (work: Promise<void>): void => event.waitUntil(work)
  const asking = { site: siteOf(event), network: addressOf(event), later }
  await enter(event, app, await signInByPasskey(app, used, asking), 'passkey')
  return { ok: true }
})
