import { PROBLEM_FILE_LIMITS } from '../../../../../shared/problem-formats'
import { uploadVersionSchema } from '../../../../../shared/schemas/problem-versions'
import { uploadedFile } from '../../../../services/problem-upload'
import { uploadVersion } from '../../../../services/version-upload'

/**
 * Multipart upload of the next version of a problem: the parts of `POST /api/problems` without `name`, and `remark`.
 * 201 with what was understood and what changed against the version before, 200 for a dry run; 409 when nothing changed.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, PROBLEM_FILE_LIMITS.sentBytes)
  const options = parse(uploadVersionSchema, upload.fields, 'The upload’s fields cannot be accepted')
  if (options.dryRun) noteNothingDone(event)
  const file = uploadedFile(app, actor, upload.file, options.kept)
  return answerWithProgress<{ bytes: number; of: number }, unknown>(event, async ({ tell, signal }) => {
    const onProgress = (bytes: number): void => tell({ bytes, of: file.bytes.byteLength })
    const result = await uploadVersion(app, actor, partOf(event, 'id'), file, options, { onProgress, signal })
    if (!options.dryRun && !event.node.res.headersSent) setResponseStatus(event, 201)
    return result
  })
})
