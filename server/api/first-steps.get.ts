import { firstStepsOf } from '../services/first-steps'

/** The newest problem, embedding, run sheet, rehearsal and submission of the person who asks; nothing of the demo's own. */
export default defineRoute('member', (_event, { app, ...actor }) => firstStepsOf(app, actor))
