import { changeAddressSchema } from '../../../shared/schemas/account'
import { askAddress } from '../../services/own-account'

/** Asks for another address: `{email, current}` → 202; a link goes to the new one. 409 where no mail is sent. */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const input = await bodyOf(event, changeAddressSchema)
  await askAddress(app, PASSWORDS, { userId, sessionId, network: addressOf(event) }, input)
  setResponseStatus(event, 202)
  return { ok: true }
})
