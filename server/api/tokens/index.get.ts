import { pageQuerySchema } from '../../../shared/schemas/common'
import { tokensOf } from '../../services/tokens'

/** Tokens for scripts, newest first: one's own, for owners everybody's: `?limit&cursor`. */
export default defineSessionRoute('member', (event, { app, ...holder }) =>
  tokensOf(app, holder, queryOf(event, pageQuerySchema)),
)
