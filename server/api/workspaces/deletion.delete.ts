import { takeDeletionBack } from '../../services/workspace-deletion'

/** Takes the deletion of the workspace back; nothing happens where none was asked for. */
export default defineSessionRoute(['owner'], async (_event, { app, userId, workspaceId }) => {
  await takeDeletionBack(app, { userId, workspaceId })
  return { ok: true }
})
