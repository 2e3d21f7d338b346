import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { latticeOf } from '../../../services/machine-files'

/** What the lattice view draws, as packed arrays (shared/packed-arrays.ts): ids, segments, usable, ends, places, missingCouplers, couplersOfMissing. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const bytes = await latticeOf(app, actor, partOf(event, 'id'), queryOf(event, calibrationQuerySchema).calibration)
  setResponseHeader(event, 'content-type', 'application/octet-stream')
  return bytes
})
