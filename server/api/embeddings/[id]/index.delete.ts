import { removeEmbedding } from '../../../services/embeddings'

/** Deletes an embedding with the drafts on it; 409 once a run sheet on it was handed over. For a minute `POST …/restore` brings it back. */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  removeEmbedding(app, actor, partOf(event, 'id')),
)
