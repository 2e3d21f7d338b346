import { inviteSchema } from '../../../shared/schemas/invitations'
import { invite } from '../../services/invitations'

/** Invites an address: `{email, roles[]}` → 201 `{id, link}`; the link is null where it is sent by mail. */
export default defineSessionRoute(['owner'], async (event, { app, ...actor }) => {
  const made = await invite(app, actor, await bodyOf(event, inviteSchema))
  setResponseStatus(event, 201)
  return made
})
