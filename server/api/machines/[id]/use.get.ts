import { machineUseQuerySchema } from '../../../../shared/schemas/machine-use'
import { machineUse } from '../../../services/machine-use'

/** The embeddings that stand on a machine, and how much of it each takes: newest first: `?calibration&limit&cursor`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  machineUse(app, actor, partOf(event, 'id'), queryOf(event, machineUseQuerySchema)),
)
