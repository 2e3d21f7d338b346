import { ARCHIVE_LIMITS } from '../../services/archive/manifest'
import { startImport } from '../../services/workspace-import'

const FIELD_BYTES = 1000

/**
 * Makes a workspace of an exported one: multipart `file` → 202 `{jobId}`. One becomes its owner; everything keeps its id and
 * its fingerprints. The job's `detail` names the workspace once it is there; nothing is kept of an import that fails or is
 * cancelled. 422 for what is no such archive.
 */
export default defineSessionRoute('member', (event, { app, userId, workspaceId }) =>
  withStoredUpload(event, { limitBytes: ARCHIVE_LIMITS.file, fieldBytes: FIELD_BYTES }, async (_fields, file) => {
    const stored = requireFile({ file })
    return answerWithProgress<never, { jobId: string }>(event, async () => {
      const jobId = await startImport(app, { userId, workspaceId }, stored)
      if (!event.node.res.headersSent) setResponseStatus(event, 202)
      return { jobId }
    })
  }),
)
