import { budgetEntriesQuerySchema } from '../../../shared/schemas/budget'
import { budgetEntriesOf, budgetFile } from '../../services/budget-view'

/** Entries of the ledger, newest first, in seconds: `?limit&cursor`; `&format=csv` for the whole ledger as a file. */
export default defineRoute(['owner', 'reviewer'], async (event, { app, ...actor }) => {
  const query = queryOf(event, budgetEntriesQuerySchema)
  if (query.format === 'json') return budgetEntriesOf(app, actor, query)
  return sendFile(event, 'budget.csv', 'text/csv', await budgetFile(app, actor))
})
