import { editEmbeddingSchema } from '../../../../shared/schemas/embeddings'
import { chooseEmbedding } from '../../../services/embeddings'
import { embeddingView } from '../../../services/embedding-view'

/**
 * `{chosen}` marks a found embedding as the one to go on with, or takes the mark away; the mark leaves any other
 * embedding of the problem on the machine. Answers the embedding; 409 where none was found.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const id = partOf(event, 'id')
  const { chosen } = await bodyOf(event, editEmbeddingSchema)
  await chooseEmbedding(app, actor, id, chosen)
  return embeddingView(app, actor, id)
})
