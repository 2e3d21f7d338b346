import { spinsSchema } from '../../../../shared/schemas/spins'
import { spinsOf } from '../../../services/spins'

/**
 * At most 14 spins as they are programmed, for the spectrum: the logical problem, or the chains of `{variables}` with
 * couplings to other chains left out: `{names, h, ends, J}`; 422 for more spins or unknown variables.
 */
export default defineRoute('member', async (event, { app, ...actor }) =>
  spinsOf(app, actor, partOf(event, 'id'), await bodyOf(event, spinsSchema)),
)
