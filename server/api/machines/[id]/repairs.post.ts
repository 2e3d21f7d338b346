import { startRepairsSchema } from '../../../../shared/schemas/repairs'
import { startRepairs } from '../../../services/repairs'

/**
 * Starts repairs of embeddings that the calibration in force broke: of those named in `embeddingIds`, else of all that wait
 * for one. 202 `{repairs:[{embeddingId, id, jobId}], refused}`; 409 where there is nothing to repair.
 */
export default defineRoute(['developer', 'steward', 'owner'], async (event, { app, ...actor }) => {
  const started = await startRepairs(app, actor, partOf(event, 'id'), await bodyOf(event, startRepairsSchema))
  setResponseStatus(event, 202)
  return started
})
