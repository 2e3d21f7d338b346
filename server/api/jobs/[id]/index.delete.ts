import { JOB_KINDS } from '../../../jobs/kinds'
import { cancelJob } from '../../../services/jobs'

/** Cancels a job; work that has a best so far keeps it. */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  cancelJob(app, actor, partOf(event, 'id'), JOB_KINDS),
)
