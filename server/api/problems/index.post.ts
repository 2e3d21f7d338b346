import { uploadProblemSchema } from '../../../shared/schemas/problems'
import { PROBLEM_LIMIT_BYTES, uploadProblem } from '../../services/problem-upload'

/**
 * Multipart upload of a problem: `file` with `name`, `form`, `format`, `convention`, `sense`, `dryRun`, `skipRejected`.
 * 201 with what was understood, 200 for a dry run; 422 with line numbers when the file cannot be accepted.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, PROBLEM_LIMIT_BYTES)
  const options = parse(uploadProblemSchema, upload.fields, 'The upload’s fields cannot be accepted')
  const result = await uploadProblem(app, actor, requireFile(upload), options)
  if (!options.dryRun) setResponseStatus(event, 201)
  return result
})
