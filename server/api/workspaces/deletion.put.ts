import { deleteWorkspaceSchema } from '../../../shared/schemas/archives'
import { askDeletion } from '../../services/workspace-deletion'

/**
 * Asks for the deletion of the workspace that one is in: `{name}`, which has to be its name → `{deletesAt}`, two weeks from
 * now. Asked again, the time stays. Everybody in it is told.
 */
export default defineSessionRoute(['owner'], async (event, { app, userId, workspaceId }) => {
  const { name } = await bodyOf(event, deleteWorkspaceSchema)
  const deletesAt = await askDeletion(app, { userId, workspaceId }, name)
  return { deletesAt: deletesAt.toISOString() }
})
