import { pageQuerySchema } from '../../../../../shared/schemas/common'
import { versionsOf } from '../../../../services/problem-versions'

/** Versions of a problem, newest first, each with what changed against the one before: `{items, nextCursor}`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  versionsOf(app, actor, partOf(event, 'id'), queryOf(event, pageQuerySchema)),
)
