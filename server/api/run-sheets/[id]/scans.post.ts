import { scanSchema } from '../../../../shared/schemas/scans'
import { startScan } from '../../../services/scans'

/**
 * Queues rehearsals of the run sheet at several chain strengths, a classical stand-in: 202 `{id, jobId}`; 422 naming a
 * strength that cannot be programmed.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const started = await startScan(app, actor, partOf(event, 'id'), await bodyOf(event, scanSchema))
  setResponseStatus(event, 202)
  return started
})
