import { solutionsQuerySchema } from '../../../../shared/schemas/returns'
import { inOriginal, solutionsCsv, solutionsOf } from '../../../services/return-view'

/**
 * Distinct decoded assignments, best first: `?decode=&format=json|csv&limit=`. Those of a reduced problem carry the
 * assignment of the problem that it came from in `lifted`; as CSV with `&lifted=true`.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { decode, format, limit, lifted } = queryOf(event, solutionsQuerySchema)
  const rows = await solutionsOf(app, actor, partOf(event, 'id'), decode, limit)
  if (format === 'json') return { items: rows, nextCursor: null }
  return sendFile(event, 'solutions.csv', 'text/csv', solutionsCsv(lifted === 'true' ? inOriginal(rows) : rows))
})
