import { referenceQuerySchema } from '../../../../shared/schemas/reference'
import { referenceFile, referenceView } from '../../../services/reference-view'

/**
 * The best known value of a problem with its state, in the problem's own sense, proved or best found:
 * `?version=&format=json|csv`; 404 with the reason where there is none.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { version, format } = queryOf(event, referenceQuerySchema)
  if (format === 'json') return referenceView(app, actor, partOf(event, 'id'), version)
  const { fileName, text } = await referenceFile(app, actor, partOf(event, 'id'), version)
  return sendFile(event, fileName, 'text/csv', text)
})
