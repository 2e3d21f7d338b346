import { scanView } from '../../services/scans'

/** A strength scan with its points so far and its knee. */
export default defineRoute('member', (event, { app, ...actor }) => scanView(app, actor, partOf(event, 'id')))
