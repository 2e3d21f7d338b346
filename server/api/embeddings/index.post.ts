import { createEmbeddingSchema } from '../../../shared/schemas/embeddings'
import { startEmbedding } from '../../services/embeddings'

/** Queues an embedding search: 202 `{id, jobId}`; 422 where a proved bound rules it out, naming the bound. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const started = await startEmbedding(app, actor, await bodyOf(event, createEmbeddingSchema))
  setResponseStatus(event, 202)
  return started
})
