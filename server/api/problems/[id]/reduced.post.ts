import { saveReducedSchema } from '../../../../shared/schemas/presolve'
import { saveReduced } from '../../../services/reductions'

/**
 * Saves what pre-solve leaves as a problem of its own: `{version?, name?}` → 201 with its id. 409 when nothing is left (the
 * message names the proved optimum) or nothing can be taken out.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const body = await bodyOf(event, saveReducedSchema)
  const saved = await saveReduced(app, actor, partOf(event, 'id'), body)
  setResponseStatus(event, 201)
  return saved
})
