import { pageQuerySchema } from '../../../shared/schemas/common'
import { archivedMembers } from '../../services/workspace-import'

/** Of an imported workspace: members where it comes from who have not come here yet, to be invited. */
export default defineSessionRoute(['owner'], (event, { app, ...actor }) =>
  archivedMembers(app, actor, queryOf(event, pageQuerySchema)),
)
