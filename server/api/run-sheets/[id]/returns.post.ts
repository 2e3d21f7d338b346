import { SAMPLES_FILE_LIMITS } from '../../../../shared/samples-files'
import { uploadReturnSchema } from '../../../../shared/schemas/returns'
import { uploadReturn } from '../../../services/returns'

/**
 * Multipart upload of returned samples: `file` (CSV, `.npy`, `.npz` or JSON, plain or gzip) with `format`, `qubitOrder`,
 * `gauges`, `machineTimeSeconds`. 201 `{id, reads, …}`; 422 with reasons. With `Accept: application/x-ndjson` progress in
 * bytes read comes first, see server/utils/progress.ts.
 */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  withStoredUpload(event, SAMPLES_FILE_LIMITS, async (fields, file) => {
    const options = parse(uploadReturnSchema, fields, 'The upload’s fields cannot be accepted')
    const id = partOf(event, 'id')
    const stored = requireFile({ file })
    return answerWithProgress<{ bytes: number; of: number }, unknown>(event, async ({ tell, signal }) => {
      const onProgress = (bytes: number): void => tell({ bytes, of: stored.bytes })
      const result = await uploadReturn(app, actor, id, stored, options, undefined, { onProgress, signal })
      if (!event.node.res.headersSent) setResponseStatus(event, 201)
      return result
    })
  }),
)
