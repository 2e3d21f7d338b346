import { presolveSchema } from '../../../../shared/schemas/presolve'
import { presolveFile } from '../../../services/presolve'

/** All variables that pre-solve takes out, with the reasons, as CSV: `?version=`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { version } = queryOf(event, presolveSchema)
  const { fileName, bytes } = await presolveFile(app, actor, partOf(event, 'id'), version, goneSignal(event))
  return sendFile(event, fileName, 'text/csv', bytes)
})
