import { resetSchema } from '../../../shared/schemas/account'
import { resetPassword } from '../../services/password-resets'

/** Sets a new password by the secret of a link, once: `{password}`; every session of the person ends. */
export default definePublicRoute(async (event, app) => {
  const { password } = await bodyOf(event, resetSchema)
  await resetPassword(app, PASSWORDS, { secret: partOf(event, 'secret'), password }, addressOf(event))
  return { ok: true }
})
