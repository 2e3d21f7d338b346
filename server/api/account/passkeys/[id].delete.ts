import { removePasskey } from '../../../services/passkeys'

/** Removes a passkey of one's own; 409 where nothing else opens the account. */
export default defineSessionRoute('member', async (event, { app, userId }) => {
  await removePasskey(app, userId, partOf(event, 'id'))
  return { ok: true }
})
