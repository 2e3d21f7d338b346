import { pageQuerySchema } from '../../../shared/schemas/common'
import { standInsOf } from '../../services/stand-ins'

/** Whose reviews are in whose hands, now and to come, the earliest first; days are of UTC. */
export default defineRoute('member', (event, { app, ...actor }) =>
  standInsOf(app, actor, queryOf(event, pageQuerySchema)),
)
