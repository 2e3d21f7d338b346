import { changeRolesSchema } from '../../../../shared/schemas/invitations'
import { changeRoles } from '../../../services/members'

/** Gives a member other roles: `{roles[]}`; 409 where the workspace would be left without an owner. */
export default defineSessionRoute(['owner'], async (event, { app, ...actor }) => {
  const { roles } = await bodyOf(event, changeRolesSchema)
  await changeRoles(app, actor, partOf(event, 'id'), roles)
  return { ok: true }
})
