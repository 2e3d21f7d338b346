import { presolveSchema } from '../../../../shared/schemas/presolve'
import { presolveState } from '../../../services/presolve'

/** The headline of a pre-solve where it is known or quickly found (`?version=`), or how far one is that is at work. */
export default defineRoute('member', (event, { app, ...actor }) =>
  presolveState(app, actor, partOf(event, 'id'), queryOf(event, presolveSchema).version),
)
