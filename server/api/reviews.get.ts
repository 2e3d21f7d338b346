import { pageQuerySchema } from '../../shared/schemas/common'
import { reviewQueue } from '../services/review-queue'

/**
 * Run sheets that wait for a reviewer, the longest waiting first: machine time (ms, an estimate), budget left (s), checks,
 * and what was changed since they were last submitted: `?limit&cursor`.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  reviewQueue(app, actor, queryOf(event, pageQuerySchema)),
)
