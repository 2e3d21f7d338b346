import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { capacityCard } from '../../../services/capacity-measurements'

/** Degrees, missing parts and the newest measured chain lengths of a machine: `?calibration=`. Nothing is worked out. */
export default defineRoute('member', (event, { app, ...actor }) =>
  capacityCard(app, actor, partOf(event, 'id'), queryOf(event, calibrationQuerySchema).calibration),
)
