import { pageQuerySchema } from '../../../../shared/schemas/common'
import { activityOfRunSheet } from '../../../services/activity'

/** What happened to a run sheet and its samples, and the run sheets made from it, newest first, by whom and when: `?limit&cursor`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  activityOfRunSheet(app, actor, partOf(event, 'id'), queryOf(event, pageQuerySchema)),
)
