import { proofSchema } from '../../../../shared/schemas/passkeys'
import { beginPasskey } from '../../../services/passkeys'

/** What a browser needs to make a passkey: `{current}`, one's password, or `{passkey}`, a passkey one has. */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const proof = await bodyOf(event, proofSchema)
  return beginPasskey(app, PASSWORDS, { userId, sessionId, network: addressOf(event) }, proof, siteOf(event))
})
