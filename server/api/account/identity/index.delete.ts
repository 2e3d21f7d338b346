import { unlinkIdentity } from '../../../services/identities'

/** Unlinks one’s account from the outside identity provider; 409 where nothing else opens the account. */
export default defineSessionRoute('member', async (_event, { app, userId }) => {
  await unlinkIdentity(app, userId)
  return { ok: true }
})
