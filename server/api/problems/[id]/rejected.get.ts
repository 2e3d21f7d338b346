import { versionQuerySchema } from '../../../../shared/schemas/problems'
import { rejectedLinesOf } from '../../../services/rejected-lines'

/** The lines that were left out of a problem, as CSV `line,reason,text`, the first 100,000; `?version=` for another version. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { version } = queryOf(event, versionQuerySchema)
  const { name, bytes } = await rejectedLinesOf(app, actor, partOf(event, 'id'), version)
  return sendFile(event, name, 'text/csv', bytes)
})
