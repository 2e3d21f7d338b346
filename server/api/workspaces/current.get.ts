import { workspaceView } from '../../services/workspace-export'

/** The workspace that one is in: its name, when it is deleted if that was asked for, and what an export would hold. */
export default defineRoute(['owner'], (_event, { app, ...actor }) => workspaceView(app, actor))
