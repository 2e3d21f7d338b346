import { archivedMembers } from '../../services/workspace-import'

/** Of an imported workspace: members where it comes from who have not come here yet, to be invited. */
export default defineSessionRoute(['owner'], async (_event, { app, ...actor }) => ({
  items: await archivedMembers(app, actor),
}))
