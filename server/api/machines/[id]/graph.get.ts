import { graphQuerySchema } from '../../../../shared/schemas/machines'
import { machineGraph, machineGraphFile } from '../../../services/machine-files'

/** The working graph: `?calibration=&format=json|csv|mtx`; json is `{nodes, edges, positions}`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const query = queryOf(event, graphQuerySchema)
  const id = partOf(event, 'id')
  if (query.format === 'json') return machineGraph(app, actor, id, query.calibration)
  const { fileName, text } = await machineGraphFile(app, actor, id, query)
  return sendFile(event, fileName, query.format === 'csv' ? 'text/csv' : 'text/plain', text)
})
