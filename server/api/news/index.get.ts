import { newsQuerySchema } from '../../../shared/schemas/news'
import { newsOf } from '../../services/news'

/** What one is told in the workspace, newest first, and how much of it is unread: `?unread&limit&cursor`. */
export default defineSessionRoute('member', (event, { app, ...actor }) =>
  newsOf(app, actor, queryOf(event, newsQuerySchema)),
)
