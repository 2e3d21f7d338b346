import { goToWorkspaceSchema } from '../../../shared/schemas/session'
import { goToWorkspace } from '../../services/workspaces'

/** Goes to another workspace of one's own: `{workspaceId}`; everything asked for after it is of that one. */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const { workspaceId } = await bodyOf(event, goToWorkspaceSchema)
  await goToWorkspace(app, { userId, sessionId }, workspaceId)
  return { ok: true }
})
