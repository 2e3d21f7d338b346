import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { machineCapacity } from '../../../services/machine-capacity'

/** The largest complete graph placed by template, and a bound on treewidth: `?calibration=`; it may take a minute. */
export default defineRoute(['developer', 'steward', 'owner'], (event, { app, ...actor }) =>
  machineCapacity(app, actor, partOf(event, 'id'), queryOf(event, calibrationQuerySchema).calibration),
)
