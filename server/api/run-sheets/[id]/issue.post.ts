import { issueSchema } from '../../../../shared/schemas/run-sheets'
import { issueRunSheet } from '../../../services/bridge-calls'

/** `{remark?, byBridge?}` → `{state}`; by the bridge of its machine the bundle is sent to that. 409 from a wrong state. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) =>
  issueRunSheet(app, actor, partOf(event, 'id'), await bodyOf(event, issueSchema)),
)
