import { remarkSchema } from '../../../../shared/schemas/run-sheets'
import { handOver } from '../../../services/review'

/**
 * `{remark?}` → `{state, for}`; 409 from a wrong state. Also by somebody signed in who reviews in the place of a reviewer who is
 * away, whom `for` then names.
 */
export default defineRoute(
  ['reviewer'],
  async (event, { app, ...actor }) =>
    handOver(app, actor, partOf(event, 'id'), 'approve', (await bodyOf(event, remarkSchema)).remark),
  { orStandIn: true },
)
