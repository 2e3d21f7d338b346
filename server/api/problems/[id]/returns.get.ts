import { returnComparisonQuerySchema } from '../../../../shared/schemas/return-comparison'
import { returnsCompared, returnsComparedFile } from '../../../services/return-comparison'

/**
 * All samples of a problem side by side, newest first, decoded one way: breaks, best, success within a gap of the reference
 * (in units of the problem), time to solution (ms), effective temperature (programmed units):
 * `?decode=majority|discard|descent&gap&limit&cursor`; `&format=csv` for the newest thousand as a file.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const query = queryOf(event, returnComparisonQuerySchema)
  if (query.format === 'json') return returnsCompared(app, actor, partOf(event, 'id'), query)
  const { fileName, text } = await returnsComparedFile(app, actor, partOf(event, 'id'), query)
  return sendFile(event, fileName, 'text/csv', text)
})
