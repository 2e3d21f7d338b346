import { leaveWorkspace } from '../../services/members'

/** Leaves the workspace that one is signed in to; 409 for its last owner. */
export default defineSessionRoute('member', async (_event, { app, ...actor }) => {
  await leaveWorkspace(app, actor)
  return { ok: true }
})
