import { setResponseHeader } from 'h3'
import { samplesQuerySchema } from '../../../../shared/schemas/returns'
import { packedSamples, samplesFile } from '../../../services/return-files'

/**
 * The raw samples: `?format=csv`, as they can be uploaded again, or `packed`, as packed arrays (shared/packed-arrays.ts):
 * `bytes` (bit-packed rows), `counts`, `qubits`, with `rows` beside them.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const id = partOf(event, 'id')
  if (queryOf(event, samplesQuerySchema).format === 'packed') {
    setResponseHeader(event, 'content-type', 'application/octet-stream')
    return packedSamples(app, actor, id)
  }
  const { fileName, bytes } = await samplesFile(app, actor, id)
  return sendFile(event, fileName, 'text/csv', bytes)
})
