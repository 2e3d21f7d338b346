import { pageQuerySchema } from '../../../../shared/schemas/common'
import { scansOf } from '../../../services/scans'

/** The strength scans of a run sheet, newest first, and what the machine returned on its embedding: `{items, nextCursor, returned}`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  scansOf(app, actor, partOf(event, 'id'), queryOf(event, pageQuerySchema)),
)
