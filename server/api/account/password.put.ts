import { changePasswordSchema } from '../../../shared/schemas/account'
import { changePassword } from '../../services/own-account'

/** Changes one's own password: `{current, password}`; every other session of one's own ends. */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const input = await bodyOf(event, changePasswordSchema)
  await changePassword(app, PASSWORDS, { userId, sessionId, network: addressOf(event) }, input)
  return { ok: true }
})
