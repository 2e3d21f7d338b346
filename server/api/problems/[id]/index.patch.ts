import { editProblemSchema } from '../../../../shared/schemas/problems'
import { editProblem } from '../../../services/problems'

/** Renames a problem or changes its note. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await editProblem(app, actor, partOf(event, 'id'), await bodyOf(event, editProblemSchema))
  return { ok: true }
})
