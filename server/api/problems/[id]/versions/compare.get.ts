import { compareVersionsSchema } from '../../../../../shared/schemas/problem-versions'
import { compareVersions } from '../../../../services/problem-versions'

/** What changed between two versions, `?from&to`: counts, and the first of each kind. */
export default defineRoute('member', (event, { app, ...actor }) =>
  compareVersions(app, actor, partOf(event, 'id'), queryOf(event, compareVersionsSchema)),
)
