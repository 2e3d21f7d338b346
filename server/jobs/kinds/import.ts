import { join } from 'node:path'
import type { App } from '../../app'
import { deleteBlobs } from '../../database/repositories/blobs'
import { countWords } from '../../services/archive/count-words'
import { rowsOf } from '../../services/archive/archive-rows'
import { Archive } from '../../services/archive/open-archive'
import type { ReadArchive } from '../../services/archive/save-archive'
import { saveArchive } from '../../services/archive/save-archive'
import { takeArrays } from '../../services/archive/take-arrays'
import { inTemporaryFolder } from '../../services/stored-files'
import type { JobContext, JobKindHandler, JobOutcome } from '../kind'

/** Most of the work is in the arrays; reading the rows comes before. */
const ROWS_SHARE = 0.1

/** Reads the archive of a workspace, checks all that it holds, and makes the workspace of it, whole or not at all. */
export const importJob: JobKindHandler = {
  async run(app, context) {
    return inTemporaryFolder(async (folder) => {
      const path = join(folder, 'archive.zip')
      await app.blobs.readToFile(context.job.subjectId, path)
      const archive = await Archive.open(path)
      try {
        return await read(app, context, archive)
      } catch (error) {
        if (!context.signal.aborted) throw error
        return cancelled(app, context)
      } finally {
        archive.close()
      }
    })
  },
  async abandon(tx, { subjectId }) {
    await deleteBlobs(tx, [subjectId])
  },
}

function cancelled(app: App, { job }: JobContext): JobOutcome {
  return {
    status: 'cancelled',
    message: 'cancelled; nothing of it was kept',
    save: (tx) => app.blobs.remove(tx, [job.subjectId]),
  }
}

async function read(app: App, context: JobContext, archive: Archive): Promise<JobOutcome> {
  const { workspace } = archive.manifest
  context.report(0, `reading ${workspace.name}`)
  const rows = await rowsOf(archive)
  const tell = (done: number, total: number): void =>
    context.report(ROWS_SHARE + ((1 - ROWS_SHARE) * done) / total, `checking: ${done} of ${total}`)
  const { blobIds, otherwise } = await takeArrays(app, archive, rows, { signal: context.signal, tell })
  const taken: ReadArchive = { manifest: archive.manifest, rows, blobIds }
  context.report(1, 'storing', { workspaceId: workspace.id, workspace: workspace.name })
  return {
    status: 'done',
    message: `${workspace.name} is here: ${countWords(rows, otherwise)}`,
    async save(tx) {
      await saveArchive(app, tx, taken, context.job.createdBy)
      await app.blobs.remove(tx, [context.job.subjectId])
    },
  }
}
