import { sendBackSchema } from '../../../../shared/schemas/run-sheets'
import { handOver } from '../../../services/review'

/** `{remark}` → `{state}`; 409 from a wrong state. */
export default defineRoute(['reviewer'], async (event, { app, ...actor }) =>
  handOver(app, actor, partOf(event, 'id'), 'sendBack', (await bodyOf(event, sendBackSchema)).remark),
)
