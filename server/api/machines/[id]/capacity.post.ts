import { measureCapacitySchema } from '../../../../shared/schemas/machine-use'
import { measureCapacity } from '../../../services/capacity-measurements'

/** Begins a measurement of the longest chains: `{calibration?, seed?, problems?, timeLimitSeconds?}`. 202 `{id, jobId}`. */
export default defineRoute(['developer', 'steward', 'owner'], async (event, { app, ...actor }) => {
  const settings = await bodyOf(event, measureCapacitySchema)
  const started = await measureCapacity(app, actor, partOf(event, 'id'), settings)
  setResponseStatus(event, 202)
  return started
})
