import { pageQuerySchema } from '../../../../shared/schemas/common'
import { activityOfProblem } from '../../../services/activity'

/** What happened to a problem, its embeddings, run sheets and samples, newest first, by whom and when: `?limit&cursor`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  activityOfProblem(app, actor, partOf(event, 'id'), queryOf(event, pageQuerySchema)),
)
