import { uploadVersionSchema } from '../../../../../shared/schemas/problem-versions'
import { PROBLEM_LIMIT_BYTES } from '../../../../services/problem-upload'
import { uploadVersion } from '../../../../services/version-upload'

/**
 * Multipart upload of the next version of a problem: the parts of `POST /api/problems` without `name`, and `remark`.
 * 201 with what was understood and what changed against the version before, 200 for a dry run; 409 when nothing changed.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, PROBLEM_LIMIT_BYTES)
  const options = parse(uploadVersionSchema, upload.fields, 'The upload’s fields cannot be accepted')
  const result = await uploadVersion(app, actor, partOf(event, 'id'), requireFile(upload), options)
  if (!options.dryRun) setResponseStatus(event, 201)
  return result
})
