import { pageQuerySchema } from '../../../shared/schemas/common'
import { invitationsOf } from '../../services/invitations'

/** Invitations that are open or have expired, newest first. */
export default defineSessionRoute(['owner'], (event, { app, ...actor }) =>
  invitationsOf(app, actor, queryOf(event, pageQuerySchema)),
)
