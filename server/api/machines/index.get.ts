import { pageQuerySchema } from '../../../shared/schemas/common'
import { machinesOf } from '../../services/machines'

/** Machines by name, with the figures of the calibration in force. */
export default defineRoute('member', (event, { app, ...actor }) =>
  machinesOf(app, actor, queryOf(event, pageQuerySchema)),
)
