import { jobOf } from '../../../services/jobs'

/** State, progress and log of a job. */
export default defineRoute('member', (event, { app, ...actor }) => jobOf(app, actor, partOf(event, 'id')))
