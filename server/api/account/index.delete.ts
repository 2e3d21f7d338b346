import { proofSchema } from '../../../shared/schemas/passkeys'
import { removeOwnAccount } from '../../services/person-removal'

/**
 * Removes one's own account for good: `{current}`, the password, or `{passkey}`. What one made stays under a name that says nothing. 409 for
 * the only owner of a workspace.
 */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const proof = await bodyOf(event, proofSchema)
  await removeOwnAccount(app, PASSWORDS, { userId, sessionId, network: addressOf(event) }, proof, siteOf(event))
  await clearUserSession(event)
  return { ok: true }
})
