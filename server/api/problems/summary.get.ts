import { librarySummary } from '../../services/library'

/** The library as a whole: `{total, states, tags}`. */
export default defineRoute('member', (_event, { app, ...actor }) => librarySummary(app, actor))
