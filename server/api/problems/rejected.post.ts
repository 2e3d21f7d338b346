import { PROBLEM_FILE_LIMITS } from '../../../shared/problem-formats'
import { uploadProblemSchema } from '../../../shared/schemas/problems'
import { uploadedFile } from '../../services/problem-upload'
import { rejectedLinesIn } from '../../services/rejected-lines'

/**
 * The lines of a file that cannot be read, as CSV `line,reason,text`, the first 100,000: the parts of a dry run of `POST
 * /api/problems`. Nothing is saved.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, PROBLEM_FILE_LIMITS.sentBytes)
  const options = parse(uploadProblemSchema, upload.fields, 'The upload’s fields cannot be accepted')
  const { name, text } = await rejectedLinesIn(app, uploadedFile(app, actor, upload.file, options.kept), options)
  return sendFile(event, name, 'text/csv', text)
})
