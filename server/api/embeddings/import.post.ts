import { importEmbeddingSchema } from '../../../shared/schemas/embeddings'
import { importEmbedding } from '../../services/embedding-import'

/** Saves chains given by variable label: 201 `{id}`, or 422 naming each broken rule. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const imported = await importEmbedding(app, actor, await bodyOf(event, importEmbeddingSchema))
  setResponseStatus(event, 201)
  return imported
})
