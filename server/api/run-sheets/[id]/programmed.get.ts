import { programmedQuerySchema } from '../../../../shared/schemas/run-sheets'
import { programmedFile, programmedView } from '../../../services/programmed-files'

/** Programmed values by qubit number: `?format=json|csv|mtx`; scale·E_logical = E_physical + offset on unbroken states. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { format } = queryOf(event, programmedQuerySchema)
  const id = partOf(event, 'id')
  if (format === 'json') return programmedView(app, actor, id)
  const { fileName, text } = await programmedFile(app, actor, id, format)
  return sendFile(event, fileName, format === 'csv' ? 'text/csv' : 'text/plain', text)
})
