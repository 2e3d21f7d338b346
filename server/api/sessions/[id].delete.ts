import { endSession } from '../../services/sessions'

/** Ends one of one's own sessions, by the id that the list gives; 404 for any other. */
export default defineSessionRoute('member', async (event, { app, userId }) => {
  await endSession(app, userId, partOf(event, 'id'))
  return { ok: true }
})
