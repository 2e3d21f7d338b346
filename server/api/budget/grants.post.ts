import { grantSchema } from '../../../shared/schemas/budget'
import { grantTime } from '../../services/budget'

/**
 * Grants machine time: `{seconds, machineId?, remark?}` → 201; below 0 seconds takes back what is neither reserved nor
 * spent, 409 where less is left. From the first grant on run sheets are approved within the budget only.
 */
export default defineRoute(['owner', 'reviewer'], async (event, { app, ...actor }) => {
  await grantTime(app, actor, await bodyOf(event, grantSchema))
  setResponseStatus(event, 201)
  return { ok: true }
})
