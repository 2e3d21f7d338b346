import { sessionsOf } from '../../services/sessions'

/** Where one is signed in, last seen first; `isThis` marks the session that asks. */
export default defineSessionRoute('member', async (_event, { app, userId, sessionId }) => ({
  items: await sessionsOf(app, userId, sessionId),
  nextCursor: null,
}))
