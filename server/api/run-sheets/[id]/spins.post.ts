import { spinsSchema } from '../../../../shared/schemas/spins'
import { spinsOf } from '../../../services/spins'

/**
 * At most 14 spins as they are programmed, for the spectrum: the logical problem, or the chains of `{variables}` with
 * couplings to other chains left out, or with `{outside: 'held'}` acting as fields of the best known state:
 * `{names, h, ends, J, held}`; 422 for more spins or unknown variables, 409 where no state is known.
 */
export default defineRoute('member', async (event, { app, ...actor }) =>
  spinsOf(app, actor, partOf(event, 'id'), await bodyOf(event, spinsSchema)),
)
