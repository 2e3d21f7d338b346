import { editProblemSchema } from '../../../../shared/schemas/problems'
import { editProblem } from '../../../services/problems'

/** Renames a problem, changes its note, or its tags: `tags: {add, remove}`. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await editProblem(app, actor, partOf(event, 'id'), await bodyOf(event, editProblemSchema))
  return { ok: true }
})
