import { invitationsOf } from '../../services/invitations'

/** Invitations that are open or have expired, newest first. */
export default defineSessionRoute(['owner'], async (_event, { app, ...actor }) => ({
  items: await invitationsOf(app, actor),
  nextCursor: null,
}))
