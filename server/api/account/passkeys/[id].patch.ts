import { renamePasskeySchema } from '../../../../shared/schemas/passkeys'
import { renamePasskey } from '../../../services/passkeys'

/** Calls a passkey of one's own something else: `{name}`. */
export default defineSessionRoute('member', async (event, { app, userId }) => {
  const { name } = await bodyOf(event, renamePasskeySchema)
  await renamePasskey(app, userId, partOf(event, 'id'), name)
  return { ok: true }
})
