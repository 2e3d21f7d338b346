import { versionQuerySchema } from '../../../../shared/schemas/problems'
import { problemView } from '../../../services/problem-view'

/** One problem with its structure report and what was built on it; `?version=` for another than the current one. */
export default defineRoute('member', (event, { app, ...actor }) =>
  problemView(app, actor, partOf(event, 'id'), queryOf(event, versionQuerySchema).version),
)
