import { precisionView } from '../../../services/precision-view'

/**
 * What control error does to a run sheet's programmed values: counts over the machine's ranges, the first coefficients
 * under 2σ, and what stronger and weaker chains would do.
 */
export default defineRoute('member', (event, { app, ...actor }) => precisionView(app, actor, partOf(event, 'id')))
