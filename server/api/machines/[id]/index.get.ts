import { machineView } from '../../../services/machines'

/** A machine's sheet at the calibration in force, and every calibration. */
export default defineRoute('member', (event, { app, ...actor }) => machineView(app, actor, partOf(event, 'id')))
