import { askResetSchema } from '../../../shared/schemas/account'
import { askReset } from '../../services/password-resets'

/**
 * Sends a link for a new password, if the address has an account: `{email}` → 202, the same either way; 409 where no mail is
 * sent; 429 with `Retry-After` in seconds after too many.
 */
export default definePublicRoute(async (event, app) => {
  const input = await bodyOf(event, askResetSchema)
  await askReset(app, input, addressOf(event), (work) => event.waitUntil(work))
  setResponseStatus(event, 202)
  return { ok: true }
})
