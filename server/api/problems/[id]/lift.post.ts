import { liftRequestSchema } from '../../../../shared/schemas/presolve'
import { liftStates } from '../../../services/lifting'

/**
 * States of a reduced problem as states of the problem that it came from first: `{form, states}` → labels, states and
 * energies of that problem. 409 for a problem that was not reduced from another one.
 */
export default defineRoute('member', async (event, { app, ...actor }) =>
  liftStates(app, actor, partOf(event, 'id'), await bodyOf(event, liftRequestSchema)),
)
