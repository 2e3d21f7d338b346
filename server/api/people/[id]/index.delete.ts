import { removeMember } from '../../../services/members'

/** Takes a member out of the workspace; 409 where it would be left without an owner. */
export default defineSessionRoute(['owner'], async (event, { app, ...actor }) => {
  await removeMember(app, actor, partOf(event, 'id'))
  return { ok: true }
})
