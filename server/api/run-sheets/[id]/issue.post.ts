import { remarkSchema } from '../../../../shared/schemas/run-sheets'
import { handOver } from '../../../services/review'

/** `{remark?}` → `{state}`; 409 from a wrong state. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) =>
  handOver(app, actor, partOf(event, 'id'), 'issue', (await bodyOf(event, remarkSchema)).remark),
)
