import { auditQuerySchema } from '../../shared/schemas/audit'
import { auditFile, auditTrail } from '../services/audit'

/**
 * Who did what to which thing, when and from where, newest first: `?by&kind&from&to&limit&cursor`, days in UTC;
 * `&format=csv` for all of it as a file.
 */
export default defineRoute(['owner'], async (event, { app, ...actor }) => {
  const query = queryOf(event, auditQuerySchema)
  if (query.format === 'json') return auditTrail(app, actor, query)
  return sendFile(event, 'audit-trail.csv', 'text/csv', await auditFile(app, actor, query))
})
