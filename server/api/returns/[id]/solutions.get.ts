import { solutionsQuerySchema } from '../../../../shared/schemas/returns'
import { inOriginal, solutionsCsv, solutionsNpy, solutionsOf } from '../../../services/return-solutions'

/**
 * Distinct decoded assignments, best first: `?decode=&format=json|csv|npy&limit=&feasible=`. Those of a reduced problem
 * carry the assignment of the problem that it came from in `lifted`; as CSV or array with `&lifted=true`. The array has a
 * row for each assignment and a column for each variable in order.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { decode, format, limit, lifted, feasible } = queryOf(event, solutionsQuerySchema)
  const asked = { decode, limit, feasibleOnly: feasible === 'true' }
  const rows = await solutionsOf(app, actor, partOf(event, 'id'), asked)
  if (format === 'json') return { items: rows, nextCursor: null }
  const shown = lifted === 'true' ? inOriginal(rows) : rows
  return format === 'csv'
    ? sendFile(event, 'solutions.csv', 'text/csv', solutionsCsv(shown))
    : sendFile(event, 'solutions.npy', 'application/octet-stream', solutionsNpy(shown))
})
