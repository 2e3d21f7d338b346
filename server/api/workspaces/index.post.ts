import { foundWorkspaceSchema } from '../../../shared/schemas/session'
import { foundWorkspace } from '../../services/workspaces'

/** Makes a workspace and goes to it, as its owner: `{name}` → 201 `{id}`. */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }) => {
  const { name } = await bodyOf(event, foundWorkspaceSchema)
  const id = await foundWorkspace(app, { userId, sessionId }, name)
  setResponseStatus(event, 201)
  return { id }
})
