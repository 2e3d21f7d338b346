import { termsQuerySchema } from '../../../../shared/schemas/problems'
import { termsOf } from '../../../services/problems'

/** Rows of both forms side by side: `?part=linear|interactions&start&limit&version`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  termsOf(app, actor, partOf(event, 'id'), queryOf(event, termsQuerySchema)),
)
