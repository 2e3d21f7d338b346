import { PROBLEM_FILE_LIMITS } from '../../../shared/problem-formats'
import { uploadProblemSchema } from '../../../shared/schemas/problems'
import { uploadedFile, uploadProblem } from '../../services/problem-upload'

/**
 * Multipart upload of a problem: `file` with `name`, `form`, `format`, `convention`, `sense`, `dryRun`, `skipRejected`; or
 * `kept`, from the answer to an earlier dry run, in place of the file. 201 with what was understood, 200 for a dry run; 422
 * with line numbers when the file cannot be accepted; 409 when it is kept no longer. With `Accept: application/x-ndjson`
 * progress in bytes read comes first, see server/utils/progress.ts.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, PROBLEM_FILE_LIMITS.sentBytes)
  const options = parse(uploadProblemSchema, upload.fields, 'The upload’s fields cannot be accepted')
  if (options.dryRun) noteNothingDone(event)
  const file = uploadedFile(app, actor, upload.file, options.kept)
  return answerWithProgress<{ bytes: number; of: number }, unknown>(event, async ({ tell, signal }) => {
    const onProgress = (bytes: number): void => tell({ bytes, of: file.bytes.byteLength })
    const result = await uploadProblem(app, actor, file, options, { onProgress, signal })
    if (!options.dryRun && !event.node.res.headersSent) setResponseStatus(event, 201)
    return result
  })
})
