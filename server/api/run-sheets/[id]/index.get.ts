import { runSheetView } from '../../../services/run-sheets'

/** A run sheet with its strength rules side by side, precision, machine time, checks and samples. */
export default defineRoute('member', (event, { app, ...actor }) => runSheetView(app, actor, partOf(event, 'id')))
