import { joinSchema } from '../../../shared/schemas/invitations'
import { acceptSignedIn } from '../../services/accept-invitation'
import { noteSignIn } from '../../services/sign-in-trail'

/**
 * Accepts an invitation to another workspace with one's own account, and goes there: `{secret}` of its link; 403 where it
 * is for another address, 404 for any that is not open.
 */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const { secret } = await bodyOf(event, joinSchema)
  await noteSignIn(app, await acceptSignedIn(app, { userId, sessionId }, secret), 'joined', addressOf(event))
  return { ok: true }
})
