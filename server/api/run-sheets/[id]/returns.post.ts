import { uploadReturnSchema } from '../../../../shared/schemas/returns'
import { uploadReturn } from '../../../services/returns'

const LIMIT_BYTES = 256 * 2 ** 20

/** Multipart upload of returned samples as CSV with a header of qubit numbers: 201 `{id, reads, …}`, or 422 with reasons. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const upload = await readUpload(event, LIMIT_BYTES)
  const options = parse(uploadReturnSchema, upload.fields, 'The upload’s fields cannot be accepted')
  const result = await uploadReturn(app, actor, partOf(event, 'id'), requireFile(upload), options)
  setResponseStatus(event, 201)
  return result
})
