import { createTokenSchema } from '../../../shared/schemas/tokens'
import { createToken } from '../../services/tokens'

/** Makes a token for one's scripts: `{name, role, expiresAt?}` → 201 `{id, token}`, the token shown this once. */
export default defineSessionRoute('member', async (event, { app, ...holder }) => {
  const made = await createToken(app, holder, await bodyOf(event, createTokenSchema))
  setResponseStatus(event, 201)
  return made
})
