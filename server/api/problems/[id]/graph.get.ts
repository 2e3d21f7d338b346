import { versionQuerySchema } from '../../../../shared/schemas/problems'
import { problemGraphOf } from '../../../services/problem-graph'

/**
 * The interactions and the coefficients of both forms as packed arrays (shared/packed-arrays.ts), with labels, form
 * and fingerprint in the header; `?version=` for another than the current one; refused above the sizes of shared/problem-graph.ts.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const bytes = await problemGraphOf(app, actor, partOf(event, 'id'), queryOf(event, versionQuerySchema).version)
  setResponseHeader(event, 'content-type', 'application/octet-stream')
  return bytes
})
