import { analysisQuerySchema } from '../../../../shared/schemas/return-analysis'
import { analysisView } from '../../../services/return-analysis'

/**
 * What samples say beyond their summary: `?decode=majority|discard|descent&gap=`. The gap is how much worse than the
 * reference optimum still counts as reached, in units of the problem, from 0. Success with R99 and time to solution,
 * breaks by length, margin and degree, gauges with tests between them, effective temperature, advice. 409 before the
 * samples are there.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  analysisView(app, actor, partOf(event, 'id'), queryOf(event, analysisQuerySchema)),
)
