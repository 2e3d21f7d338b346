import { createEmbeddingSchema } from '../../../shared/schemas/embeddings'
import { startEmbedding } from '../../services/embeddings'

/**
 * Queues the making of an embedding, by a search or from an earlier one: 202 `{id, jobId}`; 422 where a proved bound
 * rules it out, naming the bound, and where the earlier one or what must stay of it does not fit; 409 where it has no
 * chains.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const started = await startEmbedding(app, actor, await bodyOf(event, createEmbeddingSchema))
  setResponseStatus(event, 202)
  return started
})
