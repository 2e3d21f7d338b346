import { pageQuerySchema } from '../../../shared/schemas/common'
import { sessionsOf } from '../../services/sessions'

/** Where one is signed in, last seen first; `isThis` marks the session that asks. */
export default defineSessionRoute('member', (event, { app, userId, sessionId }) =>
  sessionsOf(app, userId, sessionId, queryOf(event, pageQuerySchema)),
)
