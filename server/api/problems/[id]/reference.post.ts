import { startReferenceSchema } from '../../../../shared/schemas/reference'
import { startReference } from '../../../services/reference-start'

/**
 * Queues the look for the best possible value of a problem at its current version: 202 `{id, jobId}`; 409 while one is
 * under way; 422 where the problem is too large for the method asked for.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const started = await startReference(app, actor, partOf(event, 'id'), await bodyOf(event, startReferenceSchema))
  setResponseStatus(event, 202)
  return started
})
