import { rehearseSchema } from '../../../../shared/schemas/run-sheets'
import { startRehearsal } from '../../../services/rehearsals'

/** Queues a rehearsal by simulated annealing, a classical stand-in: 202 `{returnId, jobId}`. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const started = await startRehearsal(app, actor, partOf(event, 'id'), await bodyOf(event, rehearseSchema))
  setResponseStatus(event, 202)
  return started
})
