import { resendInvitation } from '../../../services/invitations'

/** Sends an invitation again, with a new link and another week → `{id, link}`; the earlier link ends. */
export default defineSessionRoute(['owner'], (event, { app, ...actor }) =>
  resendInvitation(app, actor, partOf(event, 'id')),
)
