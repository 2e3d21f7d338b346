import { acceptSchema } from '../../../shared/schemas/invitations'
import { acceptInvitation } from '../../services/accept-invitation'

/** Accepts an invitation and signs in: `{name?, password}`; the name is for a new account. */
export default definePublicRoute(async (event, app) => {
  const input = await bodyOf(event, acceptSchema)
  await enter(event, app, await acceptInvitation(app, PASSWORDS, partOf(event, 'secret'), input, addressOf(event)))
  return { ok: true }
})
