import { scansOf } from '../../../services/scans'

/** The strength scans of a run sheet, newest first, each with its points so far and its knee. */
export default defineRoute('member', (event, { app, ...actor }) => scansOf(app, actor, partOf(event, 'id')))
