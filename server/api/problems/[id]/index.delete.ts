import { removeProblem } from '../../../services/problems'

/** Deletes a problem with its embeddings, run sheets and samples. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await removeProblem(app, actor, partOf(event, 'id'))
  return { ok: true }
})
