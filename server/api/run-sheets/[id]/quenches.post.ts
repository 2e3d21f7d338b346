import { quenchSeriesSchema } from '../../../../shared/schemas/run-sheets'
import { createQuenches } from '../../../services/run-sheet-copies'

/**
 * `{points: [s…], quenchMicroseconds?}` → 201 `{items: [{id, number, s}]}`: a draft for each s, at most 50, that follows
 * this run sheet's schedule up to s and then quenches, as fast as the machine takes where no time is given. 422 naming
 * every s that the machine would refuse; then none is made.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const series = await bodyOf(event, quenchSeriesSchema)
  const made = await createQuenches(app, actor, partOf(event, 'id'), series)
  setResponseStatus(event, 201)
  return made
})
