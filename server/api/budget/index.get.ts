import { budgetView } from '../../services/budget-view'

/**
 * Machine time granted, available, reserved and spent (s), in all and by pool; run sheets that time is held for; what was
 * spent by month (UTC), machine and problem.
 */
export default defineRoute(['owner', 'reviewer'], (_event, { app, ...actor }) => budgetView(app, actor))
