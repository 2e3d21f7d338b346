import { pageQuerySchema } from '../../../shared/schemas/common'
import { runSheetsOf } from '../../services/run-sheets'

/** Run sheets, newest change first. */
export default defineRoute('member', (event, { app, ...actor }) =>
  runSheetsOf(app, actor, queryOf(event, pageQuerySchema)),
)
