import { GRAPH_FILE_LIMITS } from '../../../shared/graph-files'
import { machineUploadSchema } from '../../../shared/schemas/machine-uploads'
import { createMachineSchema } from '../../../shared/schemas/machines'
import { createMachine } from '../../services/machine-creation'
import { uploadMachine } from '../../services/machine-upload'
import { requireFile } from '../../utils/upload'

/**
 * Adds a machine. As JSON: family with sizes, name, defects, ranges, control error, timing; 201 `{id, qubits, couplers,
 * calibration}`. As multipart for a graph of no family: `file` with the graph, `machine` with the JSON of all the rest,
 * `format` (default: detected), `dryRun` to be told what was read without saving, which needs no `machine`. 422 with line
 * numbers when the graph cannot be taken. With `Accept: application/x-ndjson` progress comes first (server/utils/progress.ts).
 */
export default defineRoute(['steward', 'owner'], async (event, { app, ...actor }) => {
  if (!getHeader(event, 'content-type')?.startsWith('multipart/form-data')) {
    const created = await createMachine(app, actor, await bodyOf(event, createMachineSchema))
    setResponseStatus(event, 201)
    return created
  }
  const upload = await readUpload(event, GRAPH_FILE_LIMITS.sentBytes, GRAPH_FILE_LIMITS.sheetBytes)
  const options = parse(machineUploadSchema, upload.fields, 'The upload’s fields cannot be accepted')
  if (options.dryRun) noteNothingDone(event)
  const file = requireFile(upload)
  return answerWithProgress<{ bytes: number; of: number }, unknown>(event, async ({ tell, signal }) => {
    const onProgress = (bytes: number): void => tell({ bytes, of: file.bytes.byteLength })
    const result = await uploadMachine(app, actor, file, options, { onProgress, signal })
    if (!options.dryRun && !event.node.res.headersSent) setResponseStatus(event, 201)
    return result
  })
})
