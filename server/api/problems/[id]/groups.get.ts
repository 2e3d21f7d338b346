import { versionQuerySchema } from '../../../../shared/schemas/problems'
import { groupsOf } from '../../../services/problem-groups'

/**
 * Constraint groups, members by label: those recognised in the coefficients and those confirmed or entered (null while
 * nobody has looked at them), each with its penalty beside what the objective can gain; `?version=` for an earlier one.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  groupsOf(app, actor, partOf(event, 'id'), queryOf(event, versionQuerySchema).version),
)
