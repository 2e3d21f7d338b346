import { calibrationQuerySchema } from '../../../../shared/schemas/machines'
import { machineView } from '../../../services/machines'

/** A machine's sheet at a calibration (`?calibration=`, else the one in force), and every calibration. */
export default defineRoute('member', (event, { app, ...actor }) =>
  machineView(app, actor, partOf(event, 'id'), queryOf(event, calibrationQuerySchema).calibration),
)
