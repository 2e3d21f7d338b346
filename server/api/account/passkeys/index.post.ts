import { newPasskeySchema } from '../../../../shared/schemas/passkeys'
import { addPasskey } from '../../../services/passkeys'

/** Keeps a passkey that the browser made: `{name, challengeId, credential}` → 201 `{id}`. */
export default defineSessionRoute('member', async (event, { app, userId }) => {
  const input = await bodyOf(event, newPasskeySchema)
  const added = await addPasskey(app, userId, input, siteOf(event))
  setResponseStatus(event, 201)
  return added
})
