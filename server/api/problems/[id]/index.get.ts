import { problemView } from '../../../services/problems'

/** One problem with its structure report and what was built on it. */
export default defineRoute('member', (event, { app, ...actor }) => problemView(app, actor, partOf(event, 'id')))
