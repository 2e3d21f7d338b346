import { exportWorkspace } from '../../services/workspace-export'

/**
 * The workspace as it is at this moment as one ZIP: rows as lines of JSON, arrays as they are stored, and a manifest with
 * the SHA-256 of each. Without accounts, sessions, tokens, invitations and messages, and without what is being worked on at
 * the moment; docs/workspace-archive.md says what is in it.
 */
export default defineRoute(['owner'], (event, { app, ...actor }) =>
  sendPacked(event, 'application/zip', (folder) => exportWorkspace(app, actor, folder)),
)
