import { acceptSchema } from '../../../shared/schemas/invitations'
import { acceptInvitation } from '../../services/accept-invitation'

/** Accepts an invitation and signs in: `{name?, password}`; the name is for a new account. */
export default definePublicRoute(async (event, app) => {
  const input = await bodyOf(event, acceptSchema)
  const actor = await acceptInvitation(app, PASSWORDS, partOf(event, 'secret'), input, addressOf(event))
  await enter(event, app, actor, 'invitation')
  return { ok: true }
})
