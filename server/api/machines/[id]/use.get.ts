import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { machineUse } from '../../../services/machine-use'

/** The embeddings that stand on a machine, and how much of it each takes: `?calibration=`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  machineUse(app, actor, partOf(event, 'id'), queryOf(event, calibrationQuerySchema).calibration),
)
