import { outboxQuerySchema } from '../../../shared/schemas/mail'
import { outboxOf } from '../../services/mail'

/** Messages to people of the workspace, newest first, with what became of them: `?state&limit&cursor`. */
export default defineRoute(['owner'], (event, { app, ...actor }) =>
  outboxOf(app, actor, queryOf(event, outboxQuerySchema)),
)
