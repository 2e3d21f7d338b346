import { usedPasskeySchema } from '../../../shared/schemas/passkeys'
import { requirePasskey } from '../../services/passkey-checks'
import { entryOf } from '../../services/sign-in'

/**
 * Signs in with a passkey: `{challengeId, credential}` → 200 with the session cookie; 401 when it opens no account; 422 when
 * what it answers was asked too long ago, or answered before; 429 with `Retry-After` in seconds after too many attempts.
 */
export default definePublicRoute(async (event, app) => {
  const used = await bodyOf(event, usedPasskeySchema)
  const { id } = await requirePasskey(app, siteOf(event), used, addressOf(event))
  await enter(event, app, await entryOf(app, id))
  return { ok: true }
})
