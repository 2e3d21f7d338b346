import { pageQuerySchema } from '../../../shared/schemas/common'
import { problemsOf } from '../../services/problems'

/** Problems, newest change first: `{items, nextCursor}`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  problemsOf(app, actor, queryOf(event, pageQuerySchema)),
)
