import { solutionsQuerySchema } from '../../../../shared/schemas/returns'
import { solutionsCsv, solutionsOf } from '../../../services/return-view'

/** Distinct decoded assignments, best first: `?decode=&format=json|csv&limit=`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { decode, format, limit } = queryOf(event, solutionsQuerySchema)
  const rows = await solutionsOf(app, actor, partOf(event, 'id'), decode, limit)
  if (format === 'json') return { items: rows, nextCursor: null }
  return sendFile(event, 'solutions.csv', 'text/csv', solutionsCsv(rows))
})
