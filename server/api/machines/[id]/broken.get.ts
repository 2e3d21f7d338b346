import { pageQuerySchema } from '../../../../shared/schemas/common'
import { brokenList } from '../../../services/broken-view'

/**
 * Embeddings that calibrations of the machine broke: damage, open run sheets, and what becomes of them. What was settled
 * before the calibration in force is left out, so that a page may hold less than its limit.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  brokenList(app, actor, partOf(event, 'id'), queryOf(event, pageQuerySchema)),
)
