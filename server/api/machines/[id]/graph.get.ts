import { graphQuerySchema } from '../../../../shared/schemas/machines'
import { machineGraphFile } from '../../../services/machine-files'

/** The working graph: `?calibration=&format=json|csv|mtx`; json is `{nodes, edges, positions}`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const query = queryOf(event, graphQuerySchema)
  const { fileName, mediaType, bytes } = await machineGraphFile(app, actor, partOf(event, 'id'), query)
  return sendFile(event, fileName, mediaType, bytes)
})
