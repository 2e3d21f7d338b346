import { pageQuerySchema } from '../../shared/schemas/common'
import { membersOf } from '../services/people'

/** The people of the workspace with their roles, by name. */
export default defineRoute('member', (event, { app, ...actor }) =>
  membersOf(app, actor, queryOf(event, pageQuerySchema)),
)
