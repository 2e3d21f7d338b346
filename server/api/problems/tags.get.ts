import { pageQuerySchema } from '../../../shared/schemas/common'
import { tagsInUse } from '../../services/library'

/** Tags in use in the workspace, in alphabetical order, with how many problems bear each. */
export default defineRoute('member', (event, { app, ...actor }) =>
  tagsInUse(app, actor, queryOf(event, pageQuerySchema)),
)
