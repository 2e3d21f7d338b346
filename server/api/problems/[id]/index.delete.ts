import { removeProblem } from '../../../services/problems'

/** Deletes a problem with its embeddings, run sheets and samples. For a minute `POST …/restore` brings it back. */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  removeProblem(app, actor, partOf(event, 'id')),
)
