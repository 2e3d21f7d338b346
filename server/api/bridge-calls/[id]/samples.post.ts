import { SAMPLES_FILE_LIMITS } from '../../../../shared/samples-files'
import { uploadReturnSchema } from '../../../../shared/schemas/returns'
import { callOfToken, takeSamples } from '../../../services/bridge-returns'

/**
 * Where a bridge sends samples back, as an upload of returned samples is sent, with the token of its call as bearer: 201
 * `{id, reads}`. The token works once; the same samples sent again get the same answer, others 409.
 */
export default definePublicRoute(async (event, app) => {
  const call = await callOfToken(app, partOf(event, 'id'), bearerOf(event))
  return withStoredUpload(event, SAMPLES_FILE_LIMITS, async (fields, file) => {
    const options = parse(uploadReturnSchema, fields, 'The upload’s fields cannot be accepted')
    const taken = await takeSamples(app, call, requireFile({ file }), options)
    setResponseStatus(event, 201)
    return taken
  })
})
