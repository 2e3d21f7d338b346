import { mailWishesSchema } from '../../../shared/schemas/mail'
import { wishMails } from '../../services/mail-wishes'

/** Says which kinds of messages of the workspace one wants: `{wanted[]}`. */
export default defineSessionRoute('member', async (event, { app, ...actor }) => {
  const { wanted } = await bodyOf(event, mailWishesSchema)
  await wishMails(app, actor, wanted)
  return { ok: true }
})
