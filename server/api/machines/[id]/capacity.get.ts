import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { newestMeasurement } from '../../../services/capacity-measurements'
import { machineCapacity } from '../../../services/machine-capacity'

/**
 * The largest complete graph placed by template, a bound on treewidth, and the newest measured chain lengths:
 * `?calibration=`; it may take a minute.
 */
export default defineRoute(['developer', 'steward', 'owner'], async (event, { app, ...actor }) => {
  const id = partOf(event, 'id')
  const capacity = await machineCapacity(app, actor, id, queryOf(event, calibrationQuerySchema).calibration)
  return { ...capacity, measured: await newestMeasurement(app, id, capacity.calibration) }
})
