import { withdrawInvitation } from '../../../services/invitations'

/** Withdraws an invitation: its link ends at once. */
export default defineSessionRoute(['owner'], async (event, { app, ...actor }) => {
  await withdrawInvitation(app, actor, partOf(event, 'id'))
  return { ok: true }
})
