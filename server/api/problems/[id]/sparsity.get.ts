import { sparsityQuerySchema } from '../../../../shared/schemas/structure'
import { sparsityPicture } from '../../../services/problem-structure'

/**
 * The pattern of the interactions as packed arrays (shared/packed-arrays.ts), at most 200 kB: counts of a raster of up to
 * `?bins=` (600) a side, of small problems every coefficient of `?form=`; `?order=given|banded`, `?version=`.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const bytes = await sparsityPicture(app, actor, partOf(event, 'id'), queryOf(event, sparsityQuerySchema))
  setResponseHeader(event, 'content-type', 'application/octet-stream')
  return bytes
})
