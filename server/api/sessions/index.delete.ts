import { endOtherSessions } from '../../services/sessions'

/** Signs one out everywhere but here. */
export default defineSessionRoute('member', async (_event, { app, userId, sessionId }) => {
  await endOtherSessions(app, userId, sessionId)
  return { ok: true }
})
