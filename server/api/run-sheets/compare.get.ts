import { compareRunSheetsSchema } from '../../../shared/schemas/run-sheets'
import { compareRunSheets } from '../../services/run-sheet-comparison'

/** `?a=&b=` two run sheets of the workspace → what each holds, field by field, and whether it differs. */
export default defineRoute('member', (event, { app, ...actor }) =>
  compareRunSheets(app, actor, queryOf(event, compareRunSheetsSchema)),
)
